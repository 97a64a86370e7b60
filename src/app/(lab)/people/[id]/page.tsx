import type { Metadata } from 'next';
import { found } from '@/app/found';
import { requireActor } from '@/app/requireActor';
import { historySection } from '@/app/(lab)/jobs/HistoryLines';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDayTime } from '@/format/dates';
import { capitalised } from '@/format/words';
import type { PersonView } from '@/schemas/people';
import { historyOf } from '@/services/audit';
import { labZone } from '@/services/lab';
import { readPerson } from '@/services/people';
import { standsAs, standsBecause } from '../personWords';
import { InviteAgain } from './InviteAgain';
import { PersonActs } from './PersonActs';
import { WatchMail } from './WatchMail';

interface Props {
  params: Promise<{ id: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { name } = await found(readPerson(await requireActor(), (await params).id));
  return { title: name };
}

/** One person: how they stand, what became of their invitation, what may be done, what was done. */
export default async function PersonPage({ params }: Props) {
  const actor = await requireActor();
  const person = await found(readPerson(actor, (await params).id));
  const history = await historyOf(actor, 'user', person.id);
  const zone = await labZone();
  const { verdict } = standsAs(person);
  const mail = person.state === 'invited' ? person.invitation?.mail : null;
  const onItsWay = mail?.state === 'sending' || (mail?.state === 'queued' && mail.reason === null);
  return (
    <Sheet
      header={
        <SheetHeader
          title={person.name}
          identity={
            <>
              <span className="[overflow-wrap:anywhere]">{person.email}</span>
              <span>{person.role}</span>
              <span>{person.organisation.name}</span>
            </>
          }
          finding={{ verdict, runs: [{ text: sentence(person, zone) }] }}
          actions={
            person.state === 'invited' && (
              <InviteAgain id={person.id} name={person.name} again={person.invitation !== null} />
            )
          }
        />
      }
      margin={[historySection(history, zone, true)]}
      marginLine={history[0]?.action}
    >
      {onItsWay && <WatchMail />}
      <SectionHeading className="mt-5" remark="by a manager; each change stands in the history">
        This person
      </SectionHeading>
      <PersonActs person={person} own={person.id === actor.publicId} />
    </Sheet>
  );
}

/** `Active. Last signed in 3 Dec 2026 10:12.` */
function sentence(person: PersonView, zone: string): string {
  const because = standsBecause(person, zone);
  const last = person.lastSignInAt ? `Last signed in ${formatDayTime(person.lastSignInAt, zone)}.` : 'Never signed in.';
  const stands = `${capitalised(standsAs(person).word)}${because ? `: ${because.replace(/\.$/, '')}` : ''}.`;
  return person.state === 'invited' ? stands : `${stands} ${last}`;
}
