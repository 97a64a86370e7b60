import type { Place } from './emissions';
import type { Port, Verdict } from './kinds';
import { standAt, STANDINGS, type Reading, type RetestPosition, type Stands, type Voice } from './retests';
import { severity } from './verdict';

export interface Asked {
  port: Port;
  place: Place;
  /** Where a reading of this state, or the state it was carried from, asks. Never empty. */
  positions: readonly RetestPosition[];
  /** Whether a reading asks for it at all: of this state, or carried from the one before. */
  claimed: boolean;
  /**
   * After a modification a single frequency clears nothing: whether the prescan of a position has been repeated.
   * Null where nothing was carried to this state, so that none was asked for.
   */
  swept: ((position: RetestPosition) => boolean) | null;
}

export interface Judgement<R extends Reading> {
  /** `gone`: no reading asks for it any more, and no final looked. */
  status: 'waiting' | 'measured' | 'cleared' | 'gone';
  /** The position that decides the status. */
  governing: Stands<R>;
  /** Each position, the one that decides first. */
  stands: Stands<R>[];
  /** Positions that are still to be measured. */
  waitsAt: RetestPosition[];
  /** The newest final that decided anything about it. */
  finalId: number | null;
  /** Positions that are under and wait for their repeated prescan. */
  unswept: RetestPosition[];
}

/**
 * How an emission stands over its positions. It waits while one of them does; it is measured once finals have decided
 * all of them, or the one that is left is over, inconclusive, contradicted or known at one height only; it is cleared
 * when every position is under and, after a modification, its prescan was repeated.
 */
export function judgeEmission<R extends Reading>(voices: readonly Voice<R>[], asked: Asked): Judgement<R> {
  const { port, place, positions, claimed, swept } = asked;
  const stands = positions.map((position) => standAt(port, voices, position, place)).sort(worstFirst);
  const governing = stands[0]!;
  const finalId = stands.reduce<number | null>(
    (newest, { finalId: id }) => (id === null ? newest : Math.max(newest ?? 0, id)),
    null,
  );
  const unswept = swept ? positions.filter((position) => !swept(position)) : [];
  const toMeasure = stands.filter(({ standing }) => standing === 'waits' || standing === 'silent');
  const waitsAt = toMeasure.map(({ position }) => position);
  const judged = (status: Judgement<R>['status']) => ({ status, governing, stands, waitsAt, finalId, unswept });
  if (!claimed && stands.some(({ finalId: id }) => id === null)) return judged('gone');
  if (waitsAt.length > 0) return judged('waiting');
  return judged(governing.standing === 'under' && unswept.length === 0 ? 'cleared' : 'measured');
}

function worstFirst<R extends Reading>(a: Stands<R>, b: Stands<R>): number {
  const rank = ({ standing }: Stands<R>) => STANDINGS.indexOf(standing);
  const verdictOf = ({ reading }: Stands<R>): Verdict => reading?.verdict ?? 'under';
  return (
    rank(a) - rank(b) ||
    severity(verdictOf(a)) - severity(verdictOf(b)) ||
    (a.reading?.marginDb ?? Infinity) - (b.reading?.marginDb ?? Infinity) ||
    (String(a.position) < String(b.position) ? -1 : 1)
  );
}

/** Less than the last figure a sheet shows: what moves by no more has not got worse. */
const SHOWN_DB = 0.05;

/** Whether an emission reads worse than it did when somebody set it aside. */
export function readsWorse(
  before: { verdict: Verdict | null; marginDb: number | null },
  now: { verdict: Verdict | null; marginDb: number | null },
): boolean {
  if (now.verdict === null || now.marginDb === null) return false;
  if (before.verdict === null || before.marginDb === null) return true;
  return severity(now.verdict) < severity(before.verdict) || now.marginDb < before.marginDb - SHOWN_DB;
}
