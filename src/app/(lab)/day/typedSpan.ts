import { instantsAt, wallMs, wallOf, type WallTime } from '@/schemas/labTime';

/** A wall time as it is typed; `second` chooses the later one in the hour that comes twice. */
export interface TypedTime extends WallTime {
  second: boolean;
}
export interface TypedSpan {
  start: TypedTime;
  end: TypedTime;
}

export interface Resolved {
  /** ISO; null while what is typed is no time, or one that the clocks leave out. */
  instant: string | null;
  problem: string | null;
  /** The wall shows it twice that night. */
  twice: boolean;
}

export function instantOf(typed: TypedTime, zone: string): Resolved {
  if (!isTyped(typed)) return { instant: null, problem: null, twice: false };
  const instants = instantsAt(typed, zone);
  const [first, later] = instants;
  if (!first) {
    const problem = `${typed.time} is left out that night: the clocks go forward. Choose the hour after it.`;
    return { instant: null, problem, twice: false };
  }
  return { instant: ((typed.second && later) || first).toISOString(), problem: null, twice: later !== undefined };
}

const isTyped = ({ day, time }: WallTime) => /^\d{4}-\d{2}-\d{2}$/.test(day) && /^\d{2}:\d{2}$/.test(time);

/** A new start takes the end along, as far apart on the wall as before. */
export function withStart({ start, end }: TypedSpan, next: TypedTime): TypedSpan {
  if (![start, end, next].every(isTyped)) return { start: next, end };
  const moved = wallMs(next) + (wallMs(end) - wallMs(start));
  return { start: next, end: { ...wallOf(new Date(moved), 'UTC'), second: false } };
}

/** How an instant is typed back: in the hour that comes twice it says which. */
export function typedOf(instant: string, zone: string): TypedTime {
  const wall = wallOf(instant, zone);
  const [, later] = instantsAt(wall, zone);
  return { ...wall, second: later !== undefined && later.toISOString() === instant };
}
