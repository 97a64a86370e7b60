'use client';

import Link from 'next/link';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatCount } from '@/format/quantities';
import type { EnteredLimitLine } from '@/schemas/tables';

/** What was entered, which sets followed or were left, and which runs keep the older revision. */
export function EnteredLine({ entered: { line, sets, left, runs } }: { entered: EnteredLimitLine }) {
  return (
    <Sheet
      header={
        <SheetHeader
          title="The limit line is entered"
          identity={<span>{line.name}</span>}
          finding={{
            verdict: left.length > 0 ? 'inconclusive' : 'under',
            children: `Revision ${line.revision} is entered.`,
          }}
          actions={
            <ButtonLink kind="primary" href={`/limits/${line.id}`}>
              Open the line
            </ButtonLink>
          }
        />
      }
    >
      {left.length > 0 && (
        <Message
          tone="inconclusive"
          className="mt-3"
          lead={`${left.length === 1 ? 'One set still names' : `${left.length} sets still name`} an older revision:`}
        >
          {left.map(({ name }) => name).join(', ')}. New runs judged by it use the older line until the set is revised
          on the <Link href="/limits#sets">limits sheet</Link>.
        </Message>
      )}
      <SectionHeading className="mt-5">Limit sets</SectionHeading>
      {sets.length > 0 ? (
        <ul className="mt-1">
          {sets.map(({ id, name, revision }) => (
            <li key={id} className="border-b border-rule py-1.5">
              {name} is at revision {revision} now. The one before takes no new run and stays readable.
            </li>
          ))}
        </ul>
      ) : (
        <p className="t-text mt-1">
          {line.revision === 1 ? (
            <>
              No set names the new line yet.{' '}
              <Link href={`/limits/sets/new?line=${line.id}`} className="text-pen underline">
                Make a set with it
              </Link>
              .
            </>
          ) : (
            'No set followed.'
          )}
        </p>
      )}
      {runs > 0 && (
        <p className="t-text mt-4 text-ink2">
          {runs === 1 ? 'One run was' : `${formatCount(runs)} runs were`} judged with an older revision and{' '}
          {runs === 1 ? 'keeps' : 'keep'} it until {runs === 1 ? 'it is' : 'they are'} evaluated again on{' '}
          {runs === 1 ? 'its sheet' : 'their sheets'}.
        </p>
      )}
    </Sheet>
  );
}
