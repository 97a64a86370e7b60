import {
  bandwidthRequiredOrNarrower,
  bandwidthRequiredOrWider,
  detectorAtOrAbove,
  detectorAtOrBelow,
  isVideoAverage,
  widestAt6DbHz,
} from './detectors';
import type { Guard } from './guard';
import { detectorOrder, provesOver, provesUnder, readAsAsked, type AskedFor, type ReadWith } from './detectors';
import { VERDICTS, type Detector, type LineDetector, type Purpose, type Verdict } from './kinds';

/** A file that broke off may have broken before it did: what is left of it is searched for what is over, no more. */
const PARTIAL = 'The file breaks off and was kept in part; nothing of it is shown to be under.';

/** One reading beside the line it is judged against. Null where there is no limit, no level or no uncertainty. */
export interface ReadingFacts {
  marginDb: number | null;
  uncertaintyDb: number | null;
  /** What the decision rule asks; left out it is guarded by U. Null where the rule misses a figure. */
  guard?: Guard | null;
  detector: Detector;
  rbwHz: number | null;
  vbwHz?: number | null;
  rbwShape?: '6 dB' | '3 dB' | null;
  lineDetector: LineDetector;
  requiredBandwidthHz: number;
  purpose: Purpose;
  /** The reading comes from a file that breaks off. */
  partial?: boolean;
}

export interface ReadingVerdict {
  verdict: Verdict;
  /** Why the reading cannot decide, as a sentence; null when it can. */
  because: string | null;
}

/** What readings of one trace can show about one line, whatever their margins. */
export interface Reach {
  under: boolean;
  over: boolean;
  otherwise: 'inconclusive' | 'needs-final' | 'not-covered';
}

/**
 * What a trace can show about a line. A final read with the line's own detector and bandwidth decides as far as its
 * uncertainty lets it. Behind a VBW narrower than its RBW a peak shows nothing. Anything else shows under only from a detector at or above the line's own in the required
 * bandwidth or wider, and over only from one at or below in the required bandwidth or narrower. An ambient run is
 * without the sample and shows nothing about it.
 */
export function reachOf(trace: ReadWith, line: AskedFor, purpose: Purpose): Reach {
  if (purpose === 'ambient') return { under: false, over: false, otherwise: 'not-covered' };
  const decides = purpose === 'final' && readAsAsked(trace, line);
  return {
    under: provesUnder(trace, line),
    over: provesOver(trace, line),
    otherwise: decides ? 'inconclusive' : 'needs-final',
  };
}

/** By the rule's guard: under beyond it, over beyond it, otherwise what the reach leaves. Source: JCGM 106:2012. */
export function decide(reach: Reach, marginDb: number, guard: Guard): Verdict {
  if (reach.under && isUnder(marginDb, guard)) return 'under';
  if (reach.over && isOver(marginDb, guard)) return 'over';
  return reach.otherwise;
}

const isUnder = (marginDb: number, { db }: Guard) => marginDb > db;
const isOver = (marginDb: number, { db, between }: Guard) => (between ? marginDb < -db : !(marginDb > db));

/** The verdict of one reading. Throws RangeError when a margin or an uncertainty is given that is not a figure. */
export function readingVerdict(facts: ReadingFacts): ReadingVerdict {
  const { marginDb, uncertaintyDb, purpose } = facts;
  if (purpose === 'ambient') return { verdict: 'not-covered', because: 'An ambient run does not judge the sample.' };
  if (marginDb === null) {
    return { verdict: 'not-covered', because: 'Without a level and a limit here there is no margin.' };
  }
  if (uncertaintyDb === null)
    return { verdict: 'not-covered', because: 'No uncertainty is stated for this frequency.' };
  if (!Number.isFinite(marginDb)) throw new RangeError(`Margin ${marginDb} dB is no figure.`);
  if (!(uncertaintyDb >= 0 && Number.isFinite(uncertaintyDb))) {
    throw new RangeError(`Expanded uncertainty ${uncertaintyDb} dB is no figure.`);
  }
  const line = { detector: facts.lineDetector, bandwidthHz: facts.requiredBandwidthHz };
  const guard = facts.guard === undefined ? { db: uncertaintyDb, between: true } : facts.guard;
  if (guard === null)
    return { verdict: 'not-covered', because: 'The decision rule needs Ucispr, and none is stated here.' };
  const verdict = decide(reachOf(facts, line, purpose), marginDb, guard);
  if (facts.partial && verdict === 'under') return { verdict: 'not-covered', because: PARTIAL };
  return { verdict, because: becauseOf(verdict, facts, marginDb, guard) };
}

/** The worse of verdicts first: over, needs a final, inconclusive, not covered, under. Null for an empty list. */
export function worstVerdict(verdicts: Iterable<Verdict>): Verdict | null {
  let worst: Verdict | null = null;
  for (const verdict of verdicts) if (worst === null || severity(verdict) < severity(worst)) worst = verdict;
  return worst;
}

/** 0 is the worst. */
export function severity(verdict: Verdict): number {
  return VERDICTS.indexOf(verdict);
}

function becauseOf(verdict: Verdict, facts: ReadingFacts, marginDb: number, guard: Guard): string | null {
  if (verdict === 'under' || verdict === 'over') return null;
  if (verdict === 'inconclusive') {
    return 'The margin is within the expanded uncertainty; another reading would not settle it.';
  }
  const { detector, rbwHz, vbwHz, rbwShape, lineDetector, requiredBandwidthHz } = facts;
  const required = bandwidthText(requiredBandwidthHz);
  if (detector === 'unknown') return 'The detector is not known, so the reading shows neither under nor over.';
  if (detectorOrder(detector) === null) {
    return `A reading in ${detector} shows neither under nor over against a limit in ${lineDetector}.`;
  }
  if (rbwHz === null) return `The RBW is not known; the limit asks for ${required}.`;
  if (isVideoAverage(facts) && typeof vbwHz === 'number') {
    const than = `narrower than RBW ${bandwidthText(rbwHz)}`;
    return `VBW ${bandwidthText(vbwHz)} is ${than}, so the reading is a video average.`;
  }
  const stated = `RBW ${bandwidthText(rbwHz)}${rbwShape === '3 dB' ? ' at 3 dB' : ''}`;
  if (isUnder(marginDb, guard)) {
    if (!detectorAtOrAbove(detector, lineDetector)) {
      return `A reading in ${detector} can lie below ${lineDetector}, so it does not show under.`;
    }
    if (!bandwidthRequiredOrWider(rbwHz, requiredBandwidthHz)) {
      return `${stated} is narrower than the ${required} required, so the level may read low.`;
    }
  }
  if (isOver(marginDb, guard)) {
    if (!detectorAtOrBelow(detector, lineDetector)) {
      return `A reading in ${detector} can lie above ${lineDetector}, so it does not show over.`;
    }
    if (!bandwidthRequiredOrNarrower(widestAt6DbHz(facts), requiredBandwidthHz)) {
      return `${stated} is wider than the ${required} required, so the level may read high.`;
    }
  }
  return `The margin is within the expanded uncertainty; a final in ${lineDetector} at ${required} has to decide.`;
}

/**
 * A bandwidth in words, with at most four significant digits: 120 kHz, 9 kHz, 1 MHz, 119.3 kHz. It is wording, for
 * sentences that name a setting, and not a result: nothing is computed from it and no figure on a page comes from it.
 */
export function bandwidthText(hz: number): string {
  const digits = (figure: number) => Number(figure.toPrecision(4));
  if (digits(hz) >= 1e6) return `${digits(hz / 1e6)} MHz`;
  return digits(hz) >= 1e3 ? `${digits(hz / 1e3)} kHz` : `${digits(hz)} Hz`;
}
