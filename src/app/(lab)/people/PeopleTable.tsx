import Link from 'next/link';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDayTime } from '@/format/dates';
import type { PersonView } from '@/schemas/people';
import { standsAs, standsBecause } from './personWords';

const WIDE = 'max-pad:hidden';
const BENCH = 'max-bench:hidden';

/** People as rows: who, of whom, as what, how they stand, when they were last here. */
export function PeopleTable({ people, zone }: { people: readonly PersonView[]; zone: string }) {
  return (
    <Table caption="People, newest first" className="[&_td]:align-top [&_th]:align-top">
      <TableHead>
        <HeadCell>Name</HeadCell>
        <HeadCell className={WIDE}>Organisation</HeadCell>
        <HeadCell className={BENCH}>Role</HeadCell>
        <HeadCell>State</HeadCell>
        <HeadCell className={WIDE}>Last sign-in</HeadCell>
      </TableHead>
      <tbody>
        {people.map((person) => {
          const { verdict, word } = standsAs(person);
          const because = standsBecause(person, zone);
          return (
            <Row key={person.id}>
              <KeyCell className="py-1.5">
                <Link
                  prefetch={false}
                  href={`/people/${person.id}`}
                  className="font-semibold text-pen max-pad:inline-block max-pad:min-h-6"
                >
                  {person.name}
                </Link>
                <span className="t-detail block font-normal [overflow-wrap:anywhere]">{person.email}</span>
                <span className="t-detail block font-normal pad:hidden">
                  {person.role}, {person.organisation.name}
                </span>
              </KeyCell>
              <Cell className={`${WIDE} py-1.5`}>{person.organisation.name}</Cell>
              <Cell className={`${BENCH} py-1.5`}>{person.role}</Cell>
              <Cell className="py-1.5">
                <VerdictWord verdict={verdict} className="max-pad:whitespace-normal">
                  {word}
                </VerdictWord>
                {because && (
                  <span className="t-detail block max-w-[26rem] whitespace-normal [overflow-wrap:anywhere]">
                    {because}
                  </span>
                )}
              </Cell>
              <Cell className={`${WIDE} py-1.5 whitespace-nowrap`} quiet>
                {person.lastSignInAt ? formatDayTime(person.lastSignInAt, zone) : 'never'}
              </Cell>
            </Row>
          );
        })}
      </tbody>
    </Table>
  );
}
