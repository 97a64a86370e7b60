import Link from 'next/link';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDistance } from '@/format/quantities';
import { DETECTOR_WORDS, PORT_WORDS } from '@/format/words';
import type { LimitSetView } from '@/schemas/bench';

const WIDE = 'max-pad:hidden';

/** Limit sets with the lines they name, by revision; those in use first. */
export function SetTable({ sets, manager }: { sets: readonly LimitSetView[]; manager: boolean }) {
  const ordered = [...sets].sort((a, b) => Number(a.withdrawnAt !== null) - Number(b.withdrawnAt !== null));
  return (
    <Table caption="Limit sets" className="[&_td]:align-top [&_td]:py-1.5! [&_th]:align-top [&_th]:py-1.5!">
      <TableHead>
        <HeadCell>Set</HeadCell>
        <HeadCell>Lines</HeadCell>
        <HeadCell className={WIDE}>Stands</HeadCell>
      </TableHead>
      <tbody>
        {ordered.map((set) => (
          <Row key={set.id} className={set.withdrawnAt === null ? undefined : 'text-ink2'}>
            <KeyCell>
              {set.name}
              <span className="t-detail block font-normal">
                {PORT_WORDS[set.port]}
                {set.distanceM !== null && `, ${formatDistance(set.distanceM)}`}, revision {set.revision}
                <span className="pad:hidden">, {set.withdrawnAt === null ? 'in use' : 'withdrawn'}</span>
              </span>
              {manager && set.withdrawnAt === null && (
                <Link
                  href={`/limits/sets/new?revises=${set.id}`}
                  className="t-detail inline-flex items-center text-pen max-pad:min-h-11"
                >
                  Revise<span className="sr-only"> {set.name}</span>
                </Link>
              )}
            </KeyCell>
            <Cell>
              {set.lines.map((line) => (
                <span key={line.id} className="block">
                  <Link href={`/limits/${line.id}`} className="inline-flex items-center text-pen max-pad:min-h-11">
                    {DETECTOR_WORDS[line.detector]}, revision {line.revision}
                    <span className="sr-only"> of {line.name}</span>
                  </Link>
                </span>
              ))}
            </Cell>
            <Cell quiet className={WIDE}>
              {set.withdrawnAt === null ? 'in use' : 'withdrawn'}
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}
