import type { Metadata } from 'next';
import Link from 'next/link';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { mayRole } from '@/auth/permissions';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { countInWords, capitalised } from '@/format/words';
import { listLimitLines } from '@/services/limitLines';
import { listLimitSets } from '@/services/limitSets';
import { FindWords } from './FindWords';
import { LineTable } from './LineTable';
import { SetTable } from './SetTable';

export const metadata: Metadata = { title: 'Limits' };

/** Every limit line by its newest revision, and every set, those withdrawn last. A designer finds nothing here. */
export default async function LimitsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const after = await asked(searchParams, 'after');
  const find = await asked(searchParams, 'find');
  const setsAfter = await asked(searchParams, 'sets');
  const lines = await listed(listLimitLines(actor, { limit: 50, after, find }));
  const sets = await listed(listLimitSets(actor, { limit: 50, after: setsAfter, withdrawn: 'with' }));
  const unsure = lines.items.filter(({ basis }) => basis !== 'verified').length;
  const manager = mayRole(actor.role, 'limit.enter');
  const words = find ? `&find=${encodeURIComponent(find)}` : '';
  const count = lines.items.length;
  return (
    <Sheet
      header={
        <SheetHeader
          title="Limits"
          identity={
            <Link href="/equipment" className="text-pen">
              Equipment and signal paths
            </Link>
          }
          finding={
            count === 0
              ? {
                  verdict: 'not-covered',
                  children: find ? `No limit line is found by “${find}”.` : 'No limit line is entered yet.',
                }
              : {
                  verdict: unsure === 0 ? 'under' : 'inconclusive',
                  children:
                    unsure === 0
                      ? 'Every line shown is verified against its source.'
                      : `${capitalised(countInWords(unsure))} of ${countInWords(count)} lines shown ${unsure === 1 ? 'is' : 'are'} not verified against the source.`,
                }
          }
          actions={
            manager && (
              <>
                <ButtonLink href="/limits/sets/new">Make a set</ButtonLink>
                <ButtonLink kind="primary" keyName="U" href="/limits/new">
                  Upload a limit line
                </ButtonLink>
              </>
            )
          }
        />
      }
    >
      <FindWords action="/limits" value={find ?? ''} label="Find a line by document, class, port or detector" />
      <SectionHeading className="mt-4" remark="newest revisions">
        Limit lines
      </SectionHeading>
      {count > 0 ? (
        <LineTable lines={lines.items} />
      ) : (
        <EmptyLine lead={find ? `No line carries these words.` : 'No limit line is entered yet.'}>
          {find ? 'Try the document’s number, a class or QP.' : 'Nothing can be judged without one.'}
        </EmptyLine>
      )}
      <Pager
        firstHref={after ? `/limits?${words.slice(1)}` : null}
        nextHref={lines.next && `/limits?after=${lines.next}${words}`}
      />
      <SectionHeading className="mt-6" remark="a withdrawn set takes no new run and stays readable" id="sets">
        Limit sets
      </SectionHeading>
      {sets.items.length > 0 ? (
        <SetTable sets={sets.items} manager={manager} />
      ) : (
        <EmptyLine lead="No limit set is made yet.">A run is judged against a set of lines.</EmptyLine>
      )}
      <Pager firstHref={setsAfter ? '/limits#sets' : null} nextHref={sets.next && `/limits?sets=${sets.next}#sets`} />
    </Sheet>
  );
}
