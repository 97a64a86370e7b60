import Link from 'next/link';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { StateTag } from '@/components/ui/StateTag';
import { formatCount } from '@/format/quantities';
import type { TrialMove } from '@/services/comparison';
import { RunTable } from '../RunTable';
import type { State } from '../stateGrid';
import { isTrial } from '../trials';
import { TrialTable } from '../TrialTable';
import type { Run } from '../worstRun';
import { StateActs } from './StateActs';

interface Props {
  state: State;
  runs: readonly Run[];
  /** What its trials moved against its own runs. */
  moves: ReadonlyMap<string, TrialMove>;
  /** How many retests of it are open, and where they stand. */
  retests: number;
  retestsHref: string;
  zone: string;
  upload: boolean;
  change: boolean;
}

/** One modification state: what it is, its runs, and what the lab may do with it. */
export function StateRuns({ state, runs, moves, retests, retestsHref, zone, upload, change }: Props) {
  const trials = runs.filter(isTrial);
  const own = runs.filter((run) => !isTrial(run));
  const counting =
    state.planned && state.runs === 0
      ? 'planned, not fitted yet'
      : [counted(state.runs - trials.length, 'run'), trials.length > 0 && counted(trials.length, 'trial')]
          .filter(Boolean)
          .join(', ');
  return (
    <section aria-label={`State ${state.label}`} id={state.label}>
      <SectionHeading className="mt-6" remark={counting}>
        <StateTag label={state.label} planned={state.planned} className="mr-2 align-[2px]" />
        {state.description}
      </SectionHeading>
      {!state.planned && <RunTable caption={`Runs of ${state.label}`} runs={own} zone={zone} />}
      {own.length === 0 && <EmptyLine lead={nothingHere(state, trials.length, upload)} />}
      <TrialTable state={state.label} trials={trials} runs={runs} moves={moves} zone={zone} />
      {retests > 0 && (
        <p className="t-detail mt-2">
          <Link prefetch={false} href={retestsHref}>
            {retests === 1 ? '1 retest is' : `${formatCount(retests)} retests are`} open
          </Link>{' '}
          in {state.label}.
        </p>
      )}
      {(upload || change) && (
        <div className="mt-2 flex flex-wrap items-start gap-x-2">
          {upload && !state.planned && (
            <ButtonLink prefetch={false} kind="quiet" size="table" href={`/sweeps/new?state=${state.id}`}>
              Upload to {state.label}
            </ButtonLink>
          )}
          {change && (
            <div className="min-w-0 flex-1">
              <StateActs state={state} />
            </div>
          )}
        </div>
      )}
    </section>
  );
}

const counted = (count: number, what: string) => `${formatCount(count)} ${what}${count === 1 ? '' : 's'}`;

function nothingHere(state: State, trials: number, upload: boolean): string {
  if (state.runs > trials) return 'Its runs are older than this list.';
  if (state.planned) return 'Nothing is measured before it is fitted.';
  return upload ? 'Upload its sweep files to measure it.' : 'Not measured yet.';
}
