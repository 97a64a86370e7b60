import Link from 'next/link';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDay } from '@/format/dates';
import { ABSENT, formatCount, formatDb } from '@/format/quantities';
import type { PathRecord } from '@/schemas/paths';

const WIDE = 'max-pad:hidden';
const dbOr = (db: number | null) => (db === null ? ABSENT : formatDb(db));

/** Every revision, newest first: a run keeps the one it was judged with. */
export function PathRevisions({ path, zone }: { path: PathRecord; zone: string }) {
  return (
    <section aria-label="Revisions" id="revisions">
      <SectionHeading className="mt-6" remark="a run keeps the revision it was judged with">
        Revisions
      </SectionHeading>
      <Table caption="Revisions of the path">
        <TableHead>
          <HeadCell>Revision</HeadCell>
          <HeadCell>Entered</HeadCell>
          <HeadCell figure unit="dB">
            U final
          </HeadCell>
          <HeadCell figure unit="dB">
            U prescan
          </HeadCell>
          <HeadCell className={WIDE}>From</HeadCell>
          <HeadCell className={WIDE}>Why</HeadCell>
          <HeadCell figure>Runs</HeadCell>
        </TableHead>
        <tbody>
          {path.revisions.map((one) => (
            <Row key={one.revision} chosen={one.revision === path.revision}>
              <KeyCell className="whitespace-nowrap">
                <Link
                  href={`/paths/${path.id}?revision=${one.revision}`}
                  className="inline-flex min-h-8 items-center text-pen max-pad:min-h-11"
                  aria-current={one.revision === path.revision ? 'true' : undefined}
                >
                  revision {one.revision}
                </Link>
              </KeyCell>
              <Cell quiet>
                {formatDay(one.enteredAt, zone)}
                {one.enteredBy && `, ${one.enteredBy.name}`}
              </Cell>
              <Cell figure>{dbOr(one.finalDb)}</Cell>
              <Cell figure>{dbOr(one.prescanDb)}</Cell>
              <Cell className={WIDE}>{one.budget ? 'budget' : 'stated'}</Cell>
              <Cell quiet className={WIDE}>
                {one.reason ?? ABSENT}
              </Cell>
              <Cell figure>{formatCount(one.runs)}</Cell>
            </Row>
          ))}
        </tbody>
      </Table>
    </section>
  );
}
