import type { SeenEmission } from './clockHarmonics';
import { positive } from './freeSpace';

export interface SwitchingConverter {
  name: string;
  frequencyHz: number;
  tolerancePpm: number;
}

export interface SidebandMatch {
  converter: string;
  /** Index of the emission that is modulated; it reads higher than its sideband. */
  carrier: number;
  /** Below the carrier where negative. */
  order: number;
  /** Distance read less order times switching frequency. */
  offsetHz: number;
  /** The sideband of the same order on the other side was read too. A single one is easily a coincidence. */
  mirrored: boolean;
}

/** Distances whose window covers this much of the switching frequency fit anything. Chosen here: as often as not. */
const SAYS_NOTHING = 0.5;

/**
 * For each emission the higher ones it could be a sideband of: carrier ± n·fsw for n from 1 to `highestOrder`, within
 * the converter's tolerance and half of both bandwidths. Mirrored ones first, then the nearest. A converter whose
 * switching frequency the bandwidths do not tell apart matches nothing. Throws RangeError on frequencies, bandwidths,
 * tolerances and orders that cannot be. Source: amplitude modulation by the switching ripple, common practice.
 */
export function findSidebands(
  emissions: readonly SeenEmission[],
  converters: readonly SwitchingConverter[],
  highestOrder: number,
): SidebandMatch[][] {
  if (!(Number.isInteger(highestOrder) && highestOrder > 0)) throw new RangeError(`${highestOrder} is no order.`);
  for (const { frequencyHz, bandwidthHz } of emissions) {
    positive('Frequency', frequencyHz, 'Hz');
    positive('Bandwidth', bandwidthHz, 'Hz');
  }
  return emissions.map((sideband, i) =>
    emissions
      .flatMap((carrier, at) =>
        carrier.levelDb > sideband.levelDb
          ? converters.flatMap((converter) => sidebandOf(emissions, i, at, converter, highestOrder) ?? [])
          : [],
      )
      .sort((a, b) => Number(b.mirrored) - Number(a.mirrored) || Math.abs(a.offsetHz) - Math.abs(b.offsetHz)),
  );
}

function sidebandOf(
  emissions: readonly SeenEmission[],
  i: number,
  carrier: number,
  { name, frequencyHz, tolerancePpm }: SwitchingConverter,
  highestOrder: number,
): SidebandMatch | null {
  if (!(tolerancePpm >= 0 && tolerancePpm < 1e6)) throw new RangeError(`${name}: ${tolerancePpm} ppm cannot be.`);
  const switchingHz = positive('Switching frequency', frequencyHz, 'Hz');
  const order = Math.round((emissions[i]!.frequencyHz - emissions[carrier]!.frequencyHz) / switchingHz);
  if (order === 0 || Math.abs(order) > highestOrder) return null;
  const offsetFor = (other: SeenEmission, signed: number) => {
    const offsetHz = other.frequencyHz - emissions[carrier]!.frequencyHz - signed * switchingHz;
    const reachHz =
      (other.bandwidthHz + emissions[carrier]!.bandwidthHz) / 2 + (Math.abs(signed) * switchingHz * tolerancePpm) / 1e6;
    if ((2 * reachHz) / switchingHz >= SAYS_NOTHING) return null;
    return Math.abs(offsetHz) <= reachHz ? offsetHz : null;
  };
  const offsetHz = offsetFor(emissions[i]!, order);
  if (offsetHz === null) return null;
  const mirrored = emissions.some(
    (other, k) => k !== carrier && other.levelDb < emissions[carrier]!.levelDb && offsetFor(other, -order) !== null,
  );
  return { converter: name, carrier, order, offsetHz, mirrored };
}
