'use client';

import { useId, useMemo, useState } from 'react';
import { useRouter } from 'next/navigation';
import { BesideChart } from '@/components/charts/BesideChart';
import { chartSubject } from '@/components/charts/chartSubject';
import type { ChartMode } from '@/components/charts/marginSeries';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { useKey } from '@/components/shell/keys';
import { Button } from '@/components/ui/Button';
import { Id } from '@/components/ui/IdentityLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { orientationOf } from '@/app/(lab)/sweeps/[id]/runWords';
import { cautionText, comparisonFinding, formatMove, namesBeside, verdictsBeside } from '@/format/comparison';
import { findingText } from '@/format/finding';
import { formatFrequency } from '@/format/frequencies';
import { DETECTOR_WORDS } from '@/format/words';
import type { ComparisonView, DifferenceView } from '@/schemas/comparison';
import { BesideLegend } from './BesideLegend';
import { EmissionTable } from './EmissionTable';
import { LayOver } from './LayOver';
import { RunBrief } from './RunBrief';
import type { ListedRun } from './runLabel';
import { useBeside } from './useBeside';

interface Props {
  comparison: ComparisonView;
  about: NonNullable<ComparisonView['about']>;
  /** Of the same sample, for choosing others. */
  runs: readonly ListedRun[];
  zone: string;
}

/** Two runs of a sample over each other: what the second moved against the first. */
export function CompareSheet({ comparison, about, runs, zone }: Props) {
  const { a, b, emissions, cautions } = about;
  const router = useRouter();
  const tableId = useId();
  const [mode, setMode] = useState<ChartMode>('margin');
  const [pair, setPair] = useState(0);
  const [selectedRank, setSelectedRank] = useState<number | null>(emissions[0]?.rank ?? null);
  const { beside, ask } = useBeside(a.id, b.id, comparison);
  const names = namesBeside(a, b);
  const subjects = useMemo(
    () => ({ a: chartSubject(a, orientationOf(a)), b: chartSubject(b, orientationOf(b)) }),
    [a, b],
  );
  const shown = comparison.differences[pair] ?? null;
  const drawn = useMemo(() => emissions.filter((emission) => emission.pair === pair), [emissions, pair]);
  const finding = comparisonFinding(names, emissions);
  if (!a.voided && !b.voided) {
    const verdicts = { a: a.evaluation.verdict, b: b.evaluation.verdict };
    finding.push({ text: ` ${verdictsBeside(names, verdicts)}` });
  }

  const swap = () => router.push(`/compare?a=${b.id}&b=${a.id}`);
  const select = (rank: number) => {
    const emission = emissions.find((one) => one.rank === rank);
    if (!emission) return;
    setSelectedRank(rank);
    setPair(emission.pair);
  };
  const step = (by: 1 | -1) => {
    const at = emissions.findIndex(({ rank }) => rank === selectedRank);
    const next = emissions[at + by];
    if (next) select(next.rank);
  };
  useKey('L', () => setMode((now) => (now === 'margin' ? 'level' : 'margin')), { says: 'margin or level', weak: true });
  useKey('ArrowDown', () => step(1), { says: 'next emission', weak: true });
  useKey('ArrowUp', () => step(-1), { says: 'emission before', weak: true });
  const selected = emissions.find(({ rank }) => rank === selectedRank);

  return (
    <Sheet
      header={
        <SheetHeader
          title={b.sample.product}
          state={{ label: b.state.label }}
          identity={
            <>
              <span>{b.organisation.name}</span>
              <span>
                job <Id>{b.job.number}</Id>
              </span>
              <span>
                sample <Id>{b.sample.code}</Id>
              </span>
              <span>
                run <Id>{b.number}</Id> beside <Id>{a.number}</Id>
              </span>
            </>
          }
          finding={{ verdict: b.voided ? 'not-covered' : b.evaluation.verdict, runs: finding }}
          actions={
            <Button keyName="X" onClick={swap}>
              Turn round
            </Button>
          }
        />
      }
      margin={[
        { id: 'second', title: names.b, children: <RunBrief run={b} zone={zone} /> },
        { id: 'first', title: names.a, children: <RunBrief run={a} zone={zone} /> },
        {
          id: 'cautions',
          title: 'What else differs',
          children:
            cautions.length === 0 ? (
              <p className="column-quiet">
                Detector, RBW, distance, position, path, limits and operating mode are the same.
              </p>
            ) : (
              <ul>
                {cautions.map((caution) => (
                  <li key={`${caution.what} ${caution.a} ${caution.b}`}>{cautionText(caution, names)}</li>
                ))}
              </ul>
            ),
        },
      ]}
      marginLine={
        selected && selected.movedDb !== null
          ? `${formatMove(selected.movedDb)} at ${formatFrequency(selected.frequencyHz)}`
          : names.b
      }
      keys={[
        { keys: ['ArrowUp', 'ArrowDown'], does: 'rows' },
        { keys: ['L'], does: 'level' },
        { keys: ['X'], does: 'turn round' },
        { keys: ['?'], does: 'all keys' },
      ]}
    >
      <BesideLegend
        mode={mode}
        onMode={setMode}
        names={names}
        differences={comparison.differences}
        pair={pair}
        onPair={setPair}
        pairWord={(difference) => pairWord(difference, about)}
        limitName={b.limitSet.name}
      />
      <BesideChart
        subjects={subjects}
        names={names}
        beside={beside}
        pair={shown}
        unit={b.limitSet.lines[0]?.unit ?? 'dBuV'}
        emissions={drawn}
        mode={mode}
        onMode={setMode}
        selectedRank={selectedRank}
        onSelect={({ rank }) => select(rank)}
        onWindow={ask}
        sentence={findingText(finding)}
        tableId={tableId}
      />
      <EmissionTable
        id={tableId}
        emissions={emissions}
        names={names}
        selectedRank={selectedRank}
        onSelect={({ rank }) => select(rank)}
      />
      <section aria-labelledby="two-others" className="print:hidden">
        <SectionHeading id="two-others" className="mt-6" remark="of the same sample, trials too">
          Two others
        </SectionHeading>
        <LayOver runs={runs} chosen={{ a: a.id, b: b.id }} />
      </section>
      <p className="t-detail mt-4">
        A difference is of levels, the highest point of each run per stretch; it is no verdict. A pre-compliance record,
        not a certificate.
      </p>
    </Sheet>
  );
}

/** `quasi-peak`; of two detectors both; of several traces with one detector its own name. */
function pairWord({ a, b }: DifferenceView, about: Props['about']): string {
  const one = about.a.traces.find(({ index }) => index === a)!;
  const other = about.b.traces.find(({ index }) => index === b)!;
  if (one.detector !== other.detector) return `${DETECTOR_WORDS[other.detector]} over ${DETECTOR_WORDS[one.detector]}`;
  const alone = about.b.traces.filter(({ detector }) => detector === other.detector).length === 1;
  return alone ? DETECTOR_WORDS[other.detector] : other.name;
}
