import { z } from 'zod';
import { clockKind } from './clock';
import { publicId } from './common';
import { operation } from './operation';

/* Where the emissions of a run may come from, by their frequencies alone. */

/** One emission: what lies nearer together than the bandwidth counts once, at its worst candidate. */
const emission = z.strictObject({ rank: z.int(), frequencyHz: z.number(), marginDb: z.number() });
export type SeenEmissionView = z.infer<typeof emission>;

export const sourcesView = z.strictObject({
  productId: publicId,
  /** Emissions that were looked at, worst first, and how many there are; a floor is none. */
  looked: z.int(),
  total: z.int(),
  explained: z.int(),
  /** Every declared clock and converter, in ascending frequency. */
  clocks: z.array(
    z.strictObject({
      id: publicId,
      name: z.string(),
      kind: clockKind,
      frequencyHz: z.number(),
      /** Emissions on one of its harmonics, in ascending frequency. */
      harmonics: z.array(
        z.strictObject({
          ...emission.shape,
          harmonic: z.int(),
          offsetHz: z.number(),
          /** How probable it is that an emission from elsewhere lies as well. */
          byChance: z.number(),
          /** Other declared clocks that could make it too. */
          also: z.array(publicId),
        }),
      ),
      /** Emissions where its harmonics lie too close together to say anything. */
      untelling: z.int(),
    }),
  ),
  /** What a converter may modulate: `frequencyHz` lies `order` times its frequency from a stronger emission. */
  sidebands: z.array(
    z.strictObject({
      ...emission.shape,
      converterId: publicId,
      carrier: emission,
      order: z.int(),
      /** Its mirror image was read too; a single one is easily a coincidence and explains nothing. */
      mirrored: z.boolean(),
    }),
  ),
  /** Whole multiples of a frequency that nobody declared, most certain first. */
  families: z.array(
    z.strictObject({
      fundamentalHz: z.number(),
      lowestHz: z.number(),
      highestHz: z.number(),
      /** Upper bound on how many such families unrelated emissions would show. */
      byChance: z.number(),
      members: z.array(z.strictObject({ ...emission.shape, harmonic: z.int() })),
    }),
  ),
  unexplained: z.array(emission),
});
export type SourcesView = z.infer<typeof sourcesView>;

export const readLikelySources = operation({
  id: 'readLikelySources',
  method: 'GET',
  path: '/api/sweeps/{id}/sources',
  summary:
    'Likely sources of a run’s emissions: declared clocks, sidebands, harmonic families found; what is unexplained',
  permission: 'sweep.read',
  status: 200,
  params: z.strictObject({ id: publicId }),
  reply: sourcesView,
});
