import { z } from 'zod';
import { detector, lineDetector, publicId } from './common';
import { operation } from './operation';

/* How a run was read, against what CISPR 16-1-1 and 16-2-x ask of a receiver. */

const figure = z.number().nullable();
const range = z.strictObject({ fromHz: z.number(), toHz: z.number() });
const common = {
  ...range.shape,
  /** `unknown`: something that decides was not stated. */
  outcome: z.enum(['ok', 'fails', 'unknown']),
  /** Why it is unknown; null otherwise. */
  because: z.string().nullable(),
  /** Document and clause the check comes from. */
  source: z.string(),
};

/** One check of one setting. Figures are what was compared, null where not known. */
export const receiverFinding = z.discriminatedUnion('what', [
  z.strictObject({
    what: z.literal('bandwidth'),
    ...common,
    figures: z.strictObject({ rbwHz: figure, at6DbHz: figure, askedHz: figure }),
  }),
  z.strictObject({
    what: z.literal('step'),
    ...common,
    figures: z.strictObject({ stepHz: figure, greatestStepHz: figure, readsLowDb: figure, model: z.string() }),
  }),
  z.strictObject({
    what: z.literal('video-bandwidth'),
    ...common,
    figures: z.strictObject({ vbwHz: figure, leastHz: figure }),
  }),
  z.strictObject({ what: z.literal('dwell'), ...common, figures: z.strictObject({ dwellS: figure, leastS: figure }) }),
  z.strictObject({
    what: z.literal('scan-time'),
    ...common,
    figures: z.strictObject({ scanTimeS: figure, leastS: figure }),
  }),
  z.strictObject({
    what: z.literal('detector'),
    ...common,
    figures: z.strictObject({
      detector,
      averageKind: z.enum(['linear', 'cispr']).nullable(),
      asked: lineDetector,
      relation: z.enum(['same', 'at-or-above', 'at-or-below', 'none']).nullable(),
    }),
  }),
  z.strictObject({
    what: z.literal('noise-floor'),
    ...common,
    lineName: z.string(),
    figures: z.strictObject({
      askedDb: z.number(),
      leastDistanceDb: figure,
      leastAtHz: figure,
      tooHigh: z.array(range),
      notKnown: z.array(range),
    }),
  }),
  z.strictObject({
    what: z.literal('overload'),
    ...common,
    figures: z.strictObject({ highestDbuv: figure, greatestDbuv: figure }),
  }),
]);
export type ReceiverFindingView = z.infer<typeof receiverFinding>;

export const receiverCheckView = z.strictObject({
  counts: z.strictObject({ ok: z.int(), fails: z.int(), unknown: z.int() }),
  traces: z.array(
    z.strictObject({
      index: z.int(),
      name: z.string(),
      detector,
      /** The run cut at the CISPR bands; `band` is null below 9 kHz and above 18 GHz. */
      parts: z.array(
        z.strictObject({
          band: z.enum(['A', 'B', 'C', 'D', 'E']).nullable(),
          ...range.shape,
          findings: z.array(receiverFinding),
        }),
      ),
      /** Noise floor by limit line, and the input. */
      whole: z.array(receiverFinding),
    }),
  ),
});
export type ReceiverCheckView = z.infer<typeof receiverCheckView>;

export const readReceiverCheck = operation({
  id: 'readReceiverCheck',
  method: 'GET',
  path: '/api/sweeps/{id}/receiver',
  summary: 'Receiver settings of a run against CISPR 16-1-1 and 16-2-x: bandwidth, step, times, detector, noise floor',
  permission: 'sweep.read',
  status: 200,
  params: z.strictObject({ id: publicId }),
  reply: receiverCheckView,
});
