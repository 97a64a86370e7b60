import type { Metadata } from 'next';
import { requireActor } from '@/app/requireActor';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDayTime } from '@/format/dates';
import { aboutLab } from '@/services/aboutLab';
import { listSessions } from '@/services/sessions';
import { agentName } from './agentName';
import { ChangePassword } from './ChangePassword';
import { EndSession, SignOut } from './EndSession';

export const metadata: Metadata = { title: 'Your account' };

const PAGE = 50;
/** Columns a phone leaves out. */
const DESK = 'max-md:hidden';

interface Props {
  searchParams: Promise<{ after?: string | string[] }>;
}

export default async function AccountPage({ searchParams }: Props) {
  const actor = await requireActor();
  const { after } = await searchParams;
  const asked = typeof after === 'string' ? after : undefined;
  const [{ items, next }, { zone }] = await Promise.all([
    listSessions(actor, { limit: PAGE, after: asked }),
    aboutLab(),
  ]);
  const at = (instant: string) => formatDayTime(instant, zone);
  return (
    <Sheet
      header={
        <SheetHeader
          title="Your account"
          identity={
            <>
              <span>{actor.name}</span>
              <span>{actor.email}</span>
              <span>{actor.role}</span>
              <span>{actor.organisationName}</span>
            </>
          }
          actions={<SignOut />}
        />
      }
    >
      <SectionHeading className="mt-5">Your password</SectionHeading>
      <p className="t-text mt-1">Changing it ends your other sessions. Nobody at the lab asks for it.</p>
      <ChangePassword email={actor.email} />
      <SectionHeading className="mt-6">Where you are signed in</SectionHeading>
      <p className="t-text mt-1">
        A session ends 12 hours after its last use, and 7 days after signing in at the latest.
      </p>
      <div className="mt-2">
        <Table caption="Your sessions, newest first">
          <TableHead>
            <HeadCell>Browser</HeadCell>
            <HeadCell>Address</HeadCell>
            <HeadCell className={DESK}>Signed in</HeadCell>
            <HeadCell>Last used</HeadCell>
            <HeadCell className={DESK}>Ends at the latest</HeadCell>
            <HeadCell>
              <span className="sr-only">End it</span>
            </HeadCell>
          </TableHead>
          <tbody>
            {items.map((session) => (
              <Row key={session.id} chosen={session.current}>
                <KeyCell title={session.agent}>{agentName(session.agent)}</KeyCell>
                <Cell>
                  <span className="t-figure">{session.address}</span>
                </Cell>
                <Cell className={DESK}>{at(session.startedAt)}</Cell>
                <Cell>{at(session.lastSeenAt)}</Cell>
                <Cell className={DESK}>{at(session.expiresAt)}</Cell>
                <Cell className="text-right">
                  {session.current ? 'this browser' : <EndSession id={session.id} name={agentName(session.agent)} />}
                </Cell>
              </Row>
            ))}
          </tbody>
        </Table>
      </div>
      <Pager firstHref={asked ? '/account' : null} nextHref={next ? `/account?after=${next}` : null}>
        {items.length === 1 ? '1 session' : `${items.length} sessions, newest first`}
      </Pager>
    </Sheet>
  );
}
