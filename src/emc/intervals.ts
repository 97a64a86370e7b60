/** A closed range of frequency. Lists of them that are `merged` ascend and do not touch. */
export interface Interval {
  fromHz: number;
  toHz: number;
}

/** Narrower than this part of its frequency, a range is the rounding of an axis and not a range. */
const HAIR = 1e-9;

/** True when there is ground between two frequencies, and not only what rounding leaves. */
export function isRange(fromHz: number, toHz: number): boolean {
  return toHz - fromHz > HAIR * toHz;
}

/** The same ground in ascending ranges that do not touch one another. */
export function merged(ranges: readonly Interval[]): Interval[] {
  const out: Interval[] = [];
  for (const { fromHz, toHz } of [...ranges].sort((a, b) => a.fromHz - b.fromHz)) {
    const last = out[out.length - 1];
    if (last && fromHz <= last.toHz) last.toHz = Math.max(last.toHz, toHz);
    else out.push({ fromHz, toHz });
  }
  return out;
}

/** What both lists cover, leaving out single frequencies and what rounding leaves. Both are merged first. */
export function intersected(a: readonly Interval[], b: readonly Interval[]): Interval[] {
  const left = merged(a);
  const right = merged(b);
  const out: Interval[] = [];
  let j = 0;
  for (const range of left) {
    while (j < right.length && right[j]!.toHz <= range.fromHz) j++;
    for (let k = j; k < right.length && right[k]!.fromHz < range.toHz; k++) {
      const fromHz = Math.max(range.fromHz, right[k]!.fromHz);
      const toHz = Math.min(range.toHz, right[k]!.toHz);
      if (isRange(fromHz, toHz)) out.push({ fromHz, toHz });
    }
  }
  return out;
}

/** What `whole` covers and `taken` does not, leaving out single frequencies and what rounding leaves. Both are merged first. */
export function without(whole: readonly Interval[], taken: readonly Interval[]): Interval[] {
  const out: Interval[] = [];
  const holes = merged(taken);
  let j = 0;
  for (const range of merged(whole)) {
    let at = range.fromHz;
    while (j < holes.length && holes[j]!.toHz <= at) j++;
    for (let k = j; k < holes.length && holes[k]!.fromHz < range.toHz; k++) {
      if (isRange(at, holes[k]!.fromHz)) out.push({ fromHz: at, toHz: holes[k]!.fromHz });
      at = Math.max(at, holes[k]!.toHz);
    }
    if (isRange(at, range.toHz)) out.push({ fromHz: at, toHz: range.toHz });
  }
  return out;
}
