import { Switch } from '@/components/ui/Switch';
import type { ChartMode } from '@/components/charts/marginSeries';
import type { DifferenceView } from '@/schemas/comparison';

interface Props {
  mode: ChartMode;
  onMode: (mode: ChartMode) => void;
  names: { a: string; b: string };
  differences: readonly DifferenceView[];
  pair: number;
  onPair: (pair: number) => void;
  /** What a pair is called: `quasi-peak`. */
  pairWord: (difference: DifferenceView) => string;
  limitName: string;
}

/** The line over the chart: which chart, which trace, which line is which run, and against what. */
export function BesideLegend({ mode, onMode, names, differences, pair, onPair, pairWord, limitName }: Props) {
  return (
    <div className="mt-4 flex flex-wrap items-center gap-x-5 gap-y-1.5 text-[0.84375rem] leading-5 text-ink2">
      <Switch<ChartMode>
        legend="Chart"
        choices={[
          { value: 'margin', word: 'Margin' },
          { value: 'level', word: 'Level' },
        ]}
        value={mode}
        onChange={onMode}
      />
      {differences.length > 1 && (
        <Switch<string>
          legend="Trace"
          choices={differences.map((difference, at) => ({ value: String(at), word: pairWord(difference) }))}
          value={String(pair)}
          onChange={(value) => onPair(Number(value))}
        />
      )}
      {(['b', 'a'] as const).map((side) => (
        <span key={side} className="inline-flex items-center gap-1.5">
          <svg width="22" height="10" viewBox="0 0 22 10" aria-hidden>
            <path
              d="M1 6c1.5 0 2-3.5 3.5-3.5S6.5 7.5 8.5 7.5s2-6 4-6 2 5.5 3.5 5.5S18.5 4 21 4"
              fill="none"
              strokeWidth={side === 'b' ? 1.4 : 1.1}
              strokeDasharray={side === 'b' ? undefined : '3 2'}
              className={side === 'b' ? 'stroke-ink' : 'stroke-ink3'}
            />
          </svg>
          {names[side]}
          {differences.length === 1 ? `, ${pairWord(differences[0]!)}` : ''}
        </span>
      ))}
      <span className="ml-auto max-pad:hidden">{limitName}</span>
    </div>
  );
}
