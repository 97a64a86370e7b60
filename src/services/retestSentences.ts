import type { RetestPosition, Stands } from '@/emc/retests';
import type { LoadedReading, LoadedRun } from './retestRuns';

const POSITIONS: Record<string, string> = {
  horizontal: 'horizontal polarisation',
  vertical: 'vertical polarisation',
  N: 'neutral N',
  null: 'the port',
};

/** `horizontal polarisation`, `line L1`, `neutral N`. */
export function positionWords(position: RetestPosition): string {
  return POSITIONS[String(position)] ?? `line ${position}`;
}

/** Why an emission stands as it does, without figures: `over, confirmed by the final R-26-032`. `from` is the state before. */
export function standingSentence(
  governing: Stands<LoadedReading>,
  { from, unswept, several }: { from: string | null; unswept: readonly RetestPosition[]; several: boolean },
): string {
  const { standing, reading } = governing;
  const runs = governing.runs as LoadedRun[];
  const named = numbersOf(runs);
  const where = several ? `, ${positionWords(governing.position)}` : '';
  switch (standing) {
    case 'waits':
      return `${reading?.verdict === 'over' ? 'over' : 'needs a final'} in ${named}${where}`;
    case 'silent':
      return from ? `carried from ${from}, not measured since${where}` : `not measured${where}`;
    case 'contradicted':
      return `over in one and not in another of ${named}: void the run that is wrong`;
    case 'over':
      return `over, confirmed by the final ${numbersOf(runs.filter(({ purpose }) => purpose === 'final'))}`;
    case 'inconclusive':
      return `inconclusive in the final ${named}`;
    case 'one-height':
      return `under in ${named}, at one antenna height only`;
    case 'under':
      return unswept.length === 0
        ? `under in ${named}`
        : `under in ${named}; waits for the repeated prescan of ${unswept.map(positionWords).join(' and ')}`;
  }
}

/** Three numbers at most, the newest. */
function numbersOf(runs: readonly LoadedRun[]): string {
  const numbers = [...new Set(runs.map(({ row }) => row.number))];
  return numbers.length > 3 ? `${numbers.slice(-3).join(', ')} and others` : numbers.join(', ');
}
