import Link from 'next/link';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatMove } from '@/format/comparison';
import { formatShortDay, dayOf } from '@/format/dates';
import { formatFrequency } from '@/format/frequencies';
import { ABSENT, formatMargin } from '@/format/quantities';
import { PORT_WORDS } from '@/format/words';
import type { TrialMove } from '@/services/comparison';
import { positionOf } from './RunTable';
import { ownRunOf } from './trials';
import type { Run } from './worstRun';

const WIDE = 'max-pad:hidden';

interface Props {
  state: string;
  trials: readonly Run[];
  /** All runs of the state. */
  runs: readonly Run[];
  moves: ReadonlyMap<string, TrialMove>;
  zone: string;
}

/** The quick trials under a state, apart from its runs: what was tried, and what it moved against the state's own run. */
export function TrialTable({ state, trials, runs, moves, zone }: Props) {
  if (trials.length === 0) return null;
  return (
    <div className="mt-4">
      <h3 className="t-text font-semibold">
        Trials under {state} <span className="t-detail font-normal">each speaks for nothing but itself</span>
      </h3>
      <Table
        caption={`Trials under ${state}, newest first`}
        className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top"
      >
        <TableHead>
          <HeadCell>Trial</HeadCell>
          <HeadCell className={WIDE}>Run</HeadCell>
          <HeadCell className={WIDE}>Port</HeadCell>
          <HeadCell className={WIDE}>Line or pol.</HeadCell>
          <HeadCell figure unit="dB" className="max-pad:pr-0!">
            Worst
          </HeadCell>
          <HeadCell figure unit="dB" className={WIDE}>
            Beside {state}
          </HeadCell>
          <HeadCell className={WIDE}>Verdict</HeadCell>
          <HeadCell className={WIDE}>Kept</HeadCell>
        </TableHead>
        <tbody>
          {trials.map((trial) => (
            <Row key={trial.id}>
              <KeyCell className="max-pad:py-2">
                <Link prefetch={false} href={`/sweeps/${trial.id}`} className="font-semibold text-pen">
                  {trial.trial}
                </Link>
                <span className="t-detail block font-normal pad:hidden">
                  <span className="t-id">{trial.number}</span>, {PORT_WORDS[trial.port]}, {positionOf(trial)}
                  <span className="block">
                    <Move trial={trial} runs={runs} moves={moves} />
                  </span>
                </span>
              </KeyCell>
              <Cell className={WIDE} quiet>
                <span className="t-id">{trial.number}</span>
              </Cell>
              <Cell className={`${WIDE} whitespace-nowrap`}>{PORT_WORDS[trial.port]}</Cell>
              <Cell className={`${WIDE} whitespace-nowrap`}>{positionOf(trial)}</Cell>
              <Cell figure strong className="max-pad:pt-2 max-pad:pr-0!">
                {trial.worst ? formatMargin(trial.worst.marginDb) : ABSENT}
              </Cell>
              <Cell figure className={WIDE}>
                <Move trial={trial} runs={runs} moves={moves} />
              </Cell>
              <Cell className={WIDE}>
                {trial.voided ? (
                  <VerdictWord verdict="not-covered">voided</VerdictWord>
                ) : (
                  <VerdictWord verdict={trial.verdict} />
                )}
              </Cell>
              <Cell quiet className={`${WIDE} whitespace-nowrap`}>
                {formatShortDay(dayOf(trial.keptAt, zone))}
              </Cell>
            </Row>
          ))}
        </tbody>
      </Table>
    </div>
  );
}

/** `3.0 lower at 144.000 MHz`, which leads to the two over each other. */
function Move({ trial, runs, moves }: { trial: Run } & Pick<Props, 'runs' | 'moves'>) {
  const own = ownRunOf(trial, runs);
  if (!own) return <span className="text-ink2">no own run</span>;
  const move = moves.get(trial.id)?.move;
  return (
    <Link
      prefetch={false}
      href={`/compare?a=${own.id}&b=${trial.id}`}
      title={`Lay ${trial.number} over ${own.number}`}
      className="inline-block max-pad:min-h-6"
    >
      {move ? `${formatMove(move.movedDb)} at ${formatFrequency(move.frequencyHz)}` : `beside ${own.number}`}
    </Link>
  );
}
