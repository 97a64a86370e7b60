import { moved, type NumberStyle } from './numbers';
import { nearest, onOrOff, quantityOf, type Entry, type Quantity } from './preamble';
import type { RecognisedSettings } from './types';
import { frequencyUnitIn, TO_HZ } from './units';

/** Keys as instruments write them (common practice), in the form `wordsOnly` gives. */
export const KEYS = {
  rbw: /^(?:rbw|res(?:olution)? ?(?:bw|bandwidth)|if ?(?:bw|bandwidth)|meas(?:urement|uring)? ?(?:bw|bandwidth))$/,
  bandwidth: /^(?:bandwidth|bw)$/,
  filter:
    /^(?:(?:rbw|bandwidth|if|resolution bandwidth) (?:filter|window|shape|type)|filter)(?: (?:bw|bandwidth|type|shape))*$/,
  vbw: /^(?:vbw|video ?(?:bw|bandwidth))$/,
  vbwState: /^(?:vbw|video ?(?:bw|bandwidth)) (?:enabled?|state|active)$/,
  sweepTime: /^(?:swt|sweep ?time(?: actual)?)$/,
  dwellTime: /^(?:dwell(?: ?time)?|meas(?:urement|uring)? ?time(?: per point)?)$/,
  attenuation: /^(?:(?:rf|input|mech) ?)?att(?:en|enuation|enuator)?$/,
  reference: /^(?:ref|ref ?level|reference ?level)$/,
  preamplifier: /^(?:int(?:ernal)? ?)?pre ?amp(?:lifier)?(?: state)?$/,
  start: /^(?:x ?start|start(?: ?freq(?:uency)?)?|f ?start|freq(?:uency)? ?start)$/,
  stop: /^(?:x ?stop|stop(?: ?freq(?:uency)?)?|f ?stop|freq(?:uency)? ?stop|end ?freq(?:uency)?)$/,
  points:
    /^(?:points|values|(?:number|no|num)(?: ?of)? ?(?:points|values|data points)|(?:sweep|trace|data|measurement) ?points|point ?count)$/,
  centre: /^cent(?:er|re) ?(?:freq(?:uency)?)?$/,
  span: /^span(?: ?freq(?:uency)?)?$/,
  xUnit: /^(?:x ?(?:axis )?units?|freq(?:uency)? units?|horizontal units?)$/,
  yUnit: /^(?:y ?(?:axis )?units?|(?:level|amplitude|trace|vertical|data)? ?units?)$/,
  detector: /^(?:trace ?)?(?:detectors?|detection|detector type|det)(?: (?:mode|type|[a-z0-9]))?$/,
  averageType: /^(?:average|averaging|avg) (?:type|mode)$/,
  mode: /^(?:trace ?)?(?:trace (?:mode|type)|function)$/,
  traceName: /^trace names?$/,
};

export interface Declared {
  settings: RecognisedSettings;
  /** Values as written with their unit, for agreement with the rows. */
  start: Quantity | null;
  stop: Quantity | null;
  span: Quantity | null;
  centre: Quantity | null;
  points: Quantity | null;
  remarks: { text: string; line: number | null }[];
}

function inHz(quantity: Quantity | null): number | null {
  if (!quantity) return null;
  const unit = quantity.unit === null ? null : frequencyUnitIn(quantity.unit);
  return unit === null ? null : moved(quantity.value, TO_HZ[unit]);
}

/** A bare bandwidth is in hertz when it cannot sensibly be kilohertz; smaller ones are asked for. */
function bandwidthHz(quantity: Quantity | null): number | null {
  if (!quantity || quantity.value <= 0) return null;
  return inHz(quantity) ?? (quantity.value >= 200 && quantity.unit === null ? quantity.value : bareAuto(quantity));
}

/** `100000.0;AUTO`: the word after the figure is no unit. */
function bareAuto({ value, unit }: Quantity): number | null {
  return unit !== null && /^(?:auto|man(?:ual)?)$/i.test(unit) && value >= 200 ? value : null;
}

/** `Bandwidth` alone may be that of an input or of a recording; a CISPR 16-1-1 bandwidth is the measuring one. */
function cisprBandwidthHz(quantity: Quantity | null): number | null {
  const hz = bandwidthHz(quantity);
  return hz === 200 || hz === 9e3 || hz === 120e3 || hz === 1e6 ? hz : null;
}

function seconds(quantity: Quantity | null): number | null {
  if (!quantity) return null;
  const unit = (quantity.unit ?? 's').toLowerCase().replace('μ', 'µ');
  if (/^(?:ms|msec)/.test(unit)) return moved(quantity.value, -3);
  if (/^[uµ]s/.test(unit)) return moved(quantity.value, -6);
  return /^(?:s|sec|seconds?|auto|man(?:ual)?)$/.test(unit) ? quantity.value : null;
}

/**
 * Settings that a preamble states. What it does not state is null.
 * @param ownFrom line from which on the preamble is that of this sweep and not of one before it
 */
export function settingsOf(entries: readonly Entry[], style: NumberStyle, ownFrom = 0): Declared {
  const find = (key: RegExp) => quantityOf(nearest(entries, key), style);
  const remarks: Declared['remarks'] = [];

  const filter = entries
    .filter((entry) => KEYS.filter.test(entry.key))
    .map((entry) => entry.values.join(' '))
    .filter((value) => /cispr|\bemi\b|[36]\s?db/i.test(value))
    .at(-1);
  const vbw = find(KEYS.vbw);
  const states = entries.filter(
    (e) => KEYS.vbwState.test(e.key) || (KEYS.vbw.test(e.key) && /[a-z]/i.test(e.values[0] ?? '')),
  );
  const vbwEnabled = states.map((entry) => onOrOff(entry.values[0])).findLast((state) => state !== null) ?? null;
  const everyVbw = entries.filter((e) => KEYS.vbw.test(e.key));
  const ownVbw = everyVbw.filter((e) => e.line >= ownFrom);
  const vbwValues = new Set((ownVbw.length > 0 ? ownVbw : everyVbw).map((e) => quantityOf(e, style)?.value));
  vbwValues.delete(undefined);
  if (vbwValues.size > 1 && vbwEnabled !== false) {
    remarks.push({
      text: `The file gives ${vbwValues.size} different video bandwidths; none is taken.`,
      line: vbw!.entry.line,
    });
  }
  const preamplifier = onOrOff(nearest(entries, KEYS.preamplifier)?.values[0]);
  const [start, stop, span, centre] = [find(KEYS.start), find(KEYS.stop), find(KEYS.span), find(KEYS.centre)];
  const points = find(KEYS.points);
  return {
    settings: {
      rbwHz: bandwidthHz(find(KEYS.rbw)) ?? cisprBandwidthHz(find(KEYS.bandwidth)),
      rbwShape: filter === undefined ? null : /3\s?db/i.test(filter) ? '3 dB' : '6 dB',
      vbwHz: vbwEnabled === false || vbwValues.size > 1 ? null : bandwidthHz(vbw),
      vbwEnabled,
      sweepTimeS: seconds(find(KEYS.sweepTime)),
      dwellTimeS: seconds(find(KEYS.dwellTime)),
      attenuationDb: find(KEYS.attenuation)?.value ?? null,
      referenceLevel: find(KEYS.reference)?.value ?? null,
      preamplifier: preamplifier === null ? null : preamplifier ? 'on' : 'off',
      startHz: inHz(start),
      stopHz: inHz(stop),
      declaredPoints: points && Number.isInteger(points.value) && points.value > 0 ? points.value : null,
    },
    start,
    stop,
    span,
    centre,
    points,
    remarks,
  };
}
