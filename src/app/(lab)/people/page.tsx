import type { Metadata } from 'next';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { formatCount } from '@/format/quantities';
import { labZone } from '@/services/lab';
import { whereMailGoes } from '@/services/mailbox';
import { listPeople } from '@/services/people';
import { OrganisationFilter } from './OrganisationFilter';
import { organisationChoices } from './organisations';
import { PeopleTable } from './PeopleTable';
import { peopleFinding } from './personWords';

export const metadata: Metadata = { title: 'People' };

const PEOPLE = 50;

/** Who may sign in to this lab's record, and whose invitation did not arrive. For managers; nobody else finds it. */
export default async function PeoplePage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const after = await asked(searchParams, 'after');
  const of = await asked(searchParams, 'of');
  const { items, next } = await listed(listPeople(actor, { limit: PEOPLE, after, organisationId: of }));
  const choices = await organisationChoices(actor);
  const zone = await labZone();
  const here = (more: Record<string, string> = {}) => {
    const query = new URLSearchParams({ ...(of && { of }), ...more });
    return `/people${query.size > 0 ? `?${query}` : ''}`;
  };
  return (
    <Sheet
      header={
        <SheetHeader
          title="People"
          finding={peopleFinding(items, whereMailGoes())}
          actions={
            <ButtonLink kind="primary" href={of ? `/people/new?of=${of}` : '/people/new'}>
              Invite a person
            </ButtonLink>
          }
        />
      }
    >
      <OrganisationFilter choices={choices} of={of ?? ''} />
      <div className="mt-4">
        <PeopleTable people={items} zone={zone} />
        {items.length === 0 && (
          <EmptyLine lead="Invite the first person.">They choose their password with the link in the e-mail.</EmptyLine>
        )}
        <Pager firstHref={after ? here() : null} nextHref={next && here({ after: next })}>
          {items.length > 0 && `${formatCount(items.length)} ${items.length === 1 ? 'person' : 'people'}, newest first`}
        </Pager>
      </div>
    </Sheet>
  );
}
