'use client';

import Link from 'next/link';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { countInWords } from '@/format/words';
import type { EquipmentRecord } from '@/schemas/bench';
import type { EnteredFactorTables } from '@/schemas/tables';
import { OutdatedRuns } from '../../OutdatedRuns';

/** What was entered, which paths followed, and which runs are left with the older table. */
export function EnteredSheet({ entered, item }: { entered: EnteredFactorTables; item: EquipmentRecord }) {
  const { tables, paths, outdated } = entered;
  const names = tables.map(({ name, revision }) => `${name} revision ${revision}`).join(' and ');
  const revised = tables.some(({ revision }) => revision > 1);
  return (
    <Sheet
      header={
        <SheetHeader
          title={tables.length === 1 ? 'The table is entered' : `${countInWords(tables.length)} tables are entered`}
          identity={<span>{item.identifier}</span>}
          finding={{
            verdict: outdated ? 'inconclusive' : 'under',
            children: `${names} ${tables.length === 1 ? 'is' : 'are'} entered.`,
          }}
          actions={
            <ButtonLink kind="primary" href={`/equipment/${item.id}?table=${tables[0]!.id}`}>
              Open the sheet of {item.identifier}
            </ButtonLink>
          }
        />
      }
    >
      {outdated && <OutdatedRuns outdated={outdated} className="mt-3" />}
      <SectionHeading className="mt-5">Signal paths</SectionHeading>
      {paths.length > 0 ? (
        <ul className="mt-1">
          {paths.map(({ id, code, name, revision }) => (
            <li key={id} className="border-b border-rule py-1.5">
              <Link href="/equipment#paths" className="t-id text-pen">
                {code}
              </Link>{' '}
              {name} is at revision {revision} now. Runs measured from now on use it; earlier ones keep theirs.
            </li>
          ))}
        </ul>
      ) : (
        <p className="t-text mt-1">
          {revised
            ? 'No path used an older revision, so none had to follow.'
            : 'The name is new, so no path uses it yet.'}
        </p>
      )}
      {!outdated && revised && (
        <p className="t-text mt-4 text-ink2">No run since the calibration used an older revision.</p>
      )}
    </Sheet>
  );
}
