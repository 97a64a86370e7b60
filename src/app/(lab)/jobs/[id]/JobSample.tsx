import Link from 'next/link';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatFrequencyMhz } from '@/format/frequencies';
import { ABSENT, formatCount, formatMargin } from '@/format/quantities';
import { PORT_WORDS } from '@/format/words';
import type { Standing } from '@/app/(lab)/samples/standing';
import type { SampleView } from '@/schemas/job';

const WIDE = 'max-pad:hidden';

/** One sample of a job: its states, newest first, with the verdict of each port measured in them. */
export function JobSample({ sample, standings }: { sample: SampleView; standings: readonly Standing[] }) {
  const { code, serial, firmware, description } = sample;
  return (
    <div className="pt-2 pb-4">
      <p className="flex flex-wrap items-baseline gap-x-[18px] text-ink2">
        <Link prefetch={false} href={`/samples/${sample.id}`} className="t-id font-semibold text-pen">
          {code}
        </Link>
        <span>
          serial <span className="t-id">{serial}</span>
        </span>
        {firmware && <span>firmware {firmware}</span>}
        {description && <span>{description}</span>}
      </p>
      <Table caption={`States of ${code}`} className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
        <TableHead>
          <HeadCell>State</HeadCell>
          <HeadCell className={WIDE}>What was changed</HeadCell>
          <HeadCell>Port</HeadCell>
          <HeadCell figure unit="dB">
            Worst
          </HeadCell>
          <HeadCell figure unit="MHz" className={WIDE}>
            at
          </HeadCell>
          <HeadCell>Verdict</HeadCell>
          <HeadCell figure className={WIDE}>
            Runs
          </HeadCell>
        </TableHead>
        <tbody>
          {[...sample.states].reverse().map((state) => (
            <StateRows
              key={state.id}
              state={state}
              standings={standings.filter((standing) => standing.state === state.label)}
            />
          ))}
        </tbody>
      </Table>
    </div>
  );
}

function StateRows({ state, standings }: { state: SampleView['states'][number]; standings: readonly Standing[] }) {
  const lines = standings.length > 0 ? standings : [null];
  return lines.map((standing, at) => (
    <Row key={standing?.port ?? 'none'}>
      <KeyCell className="max-pad:py-2">
        {at === 0 ? (
          <StateTag label={state.label} planned={state.planned} />
        ) : (
          <span className="sr-only">state {state.label}</span>
        )}
      </KeyCell>
      <Cell className={WIDE}>{at === 0 ? state.description : ''}</Cell>
      <Cell className="whitespace-nowrap max-pad:pt-2">{standing ? PORT_WORDS[standing.port] : ABSENT}</Cell>
      <Cell figure strong className="max-pad:pt-2">
        {standing?.worst ? formatMargin(standing.worst.marginDb) : ABSENT}
      </Cell>
      <Cell figure className={WIDE}>
        {standing?.worst ? formatFrequencyMhz(standing.worst.frequencyHz) : ABSENT}
      </Cell>
      <Cell className="whitespace-nowrap max-pad:pt-2">
        {standing ? (
          <VerdictWord verdict={standing.verdict} />
        ) : (
          <span className="text-ink2">
            {state.planned ? 'planned' : state.runs > 0 ? 'ambient only, or older' : 'not measured'}
          </span>
        )}
      </Cell>
      <Cell figure className={WIDE}>
        {at === 0 ? formatCount(state.runs) : ''}
      </Cell>
    </Row>
  ));
}
