import type { Filter } from './bandwidthCheck';
import { BANDWIDTH_TOLERANCE } from './detectors';
import { positive } from './freeSpace';
import type { Interval } from './intervals';
import { stated, type StepFinding } from './receiverFinding';

/**
 * By how many dB a steady carrier can read low when it lies midway between two points: a Gaussian filter is down by
 * n·(offset / half its n dB bandwidth)², so by n·(step/RBW)², n being 6.02 or 3.01. At half the RBW that is 1.51 dB for
 * a 6 dB bandwidth and 0.75 dB for a 3 dB one. It is the worst case of readings taken at the points alone; a sweep
 * whose peak detector holds what it passed between points loses nothing. Source: |H|² = exp(−a·f²). Throws RangeError
 * on a step or RBW of zero or less.
 */
export function readsLowDb(stepHz: number, rbwHz: number, rbwShape: '6 dB' | '3 dB'): number {
  const atEdgeDb = (rbwShape === '6 dB' ? 20 : 10) * Math.log10(2);
  return atEdgeDb * (positive('Step', stepHz, 'Hz') / positive('RBW', rbwHz, 'Hz')) ** 2;
}

/**
 * The largest step of a segment against half its RBW, within 1 %, with how low a carrier may read between points. The
 * model is a Gaussian at the RBW as stated, 6 dB where that is not stated (the larger loss). Source: usual practice for
 * swept and stepped scans. Throws RangeError on a step or RBW of zero or less.
 */
export function stepFinding({ fromHz, toHz }: Interval, stepHz: number | null, filter: Filter): StepFinding {
  const rbwHz = stated('RBW', filter.rbwHz, 'Hz');
  const shape = filter.rbwShape ?? '6 dB';
  const greatestStepHz = rbwHz === null ? null : rbwHz / 2;
  const known = stated('Step', stepHz, 'Hz') !== null && greatestStepHz !== null;
  const fine = known && stepHz! <= greatestStepHz * (1 + BANDWIDTH_TOLERANCE);
  return {
    what: 'step',
    fromHz,
    toHz,
    outcome: known ? (fine ? 'ok' : 'fails') : 'unknown',
    figures: {
      stepHz,
      greatestStepHz,
      readsLowDb: known ? readsLowDb(stepHz!, rbwHz!, shape) : null,
      model: `Gaussian, ${shape} bandwidth`,
    },
    because: known ? null : `The ${rbwHz === null ? 'RBW' : 'step'} is not known.`,
    source: 'Usual practice: step of at most half the RBW',
  };
}

/**
 * Points of a sweep at half its RBW: the smallest odd number not below 2·span/RBW. Source: band presets as published
 * (1411 points in band A, 6635 in B). Its step lies within 0.1 % of half the RBW. Throws RangeError on what is no range
 * or RBW.
 */
export function sweepPoints(startHz: number, stopHz: number, rbwHz: number): number {
  const spanHz = positive('Span', stopHz - startHz, 'Hz');
  const least = Math.ceil((2 * spanHz) / positive('RBW', rbwHz, 'Hz'));
  return least % 2 === 1 ? least : least + 1;
}
