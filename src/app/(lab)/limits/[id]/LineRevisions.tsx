import Link from 'next/link';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDay } from '@/format/dates';
import { ABSENT } from '@/format/quantities';
import type { LimitLineSummary } from '@/schemas/tables';
import { basisVerdict } from '../limitWords';

interface Props {
  revisions: readonly LimitLineSummary[];
  chosenId: string;
  zone: string;
}

const WIDE = 'max-pad:hidden';

/** Every revision of one line, newest first: what was judged by an earlier one still names it. */
export function LineRevisions({ revisions, chosenId, zone }: Props) {
  return (
    <section aria-label="Revisions">
      <SectionHeading className="mt-6" remark="newest first">
        Revisions
      </SectionHeading>
      <Table caption="Revisions of this line" className="max-pad:[&_td]:align-top">
        <TableHead>
          <HeadCell>Revision</HeadCell>
          <HeadCell>Entered</HeadCell>
          <HeadCell className={WIDE}>Reason</HeadCell>
          <HeadCell>Basis</HeadCell>
          <HeadCell className={WIDE}>File</HeadCell>
        </TableHead>
        <tbody>
          {revisions.map((one) => (
            <Row key={one.id} chosen={one.id === chosenId}>
              <KeyCell className="whitespace-nowrap">
                <Link
                  href={`/limits/${one.id}`}
                  className="inline-flex min-h-8 items-center text-pen max-pad:min-h-11"
                  aria-current={one.id === chosenId ? 'page' : undefined}
                >
                  revision {one.revision}
                </Link>
              </KeyCell>
              <Cell quiet>
                {formatDay(one.enteredAt, zone)}
                {one.enteredBy && `, ${one.enteredBy.name}`}
              </Cell>
              <Cell className={WIDE}>{one.reason ?? ABSENT}</Cell>
              <Cell>
                <VerdictWord verdict={basisVerdict(one.basis)}>{one.basis}</VerdictWord>
              </Cell>
              <Cell className={WIDE}>
                <a href={`/api/limit-lines/${one.id}/csv`} download className="text-pen hover:underline">
                  CSV<span className="sr-only"> of revision {one.revision}</span>
                </a>
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
    </section>
  );
}
