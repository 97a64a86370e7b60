import { formatFigure, formatTrimmed } from './quantities';

/** A reading's frequency in MHz without its unit, three decimals: `144.018`, `1 000.000`. */
export function formatFrequencyMhz(frequencyHz: number): string {
  return formatFigure(frequencyHz / 1e6, 3);
}

/** The same in kHz, three decimals, for band A tables. */
export function formatFrequencyKhz(frequencyHz: number): string {
  return formatFigure(frequencyHz / 1e3, 3);
}

/**
 * A reading's frequency with its unit: `144.018 MHz`, `0.585 MHz`; below 150 kHz, where CISPR band A ends, `65.000 kHz`;
 * below 1 kHz `50.0 Hz`. The unit follows the rounded figure, so nothing reads `1 000.000 Hz`.
 */
export function formatFrequency(frequencyHz: number): string {
  const size = Math.abs(frequencyHz);
  if (size >= 150_000) return `${formatFrequencyMhz(frequencyHz)} MHz`;
  if (size >= 999.95) return `${formatFrequencyKhz(frequencyHz)} kHz`;
  return `${formatFigure(frequencyHz, 1)} Hz`;
}

/** A setting, such as a bandwidth, a step or a clock, at most three decimals: `120 kHz`, `9 kHz`, `200 Hz`, `1 MHz`. */
export function formatBandwidth(bandwidthHz: number): string {
  const size = Math.abs(bandwidthHz);
  if (size >= 999_999.5) return `${formatTrimmed(bandwidthHz / 1e6, 3)} MHz`;
  if (size >= 999.9995) return `${formatTrimmed(bandwidthHz / 1e3, 3)} kHz`;
  return `${formatTrimmed(bandwidthHz, 3)} Hz`;
}

/**
 * A range as the trade names it: `30–1000 MHz`, `0.15–30 MHz`, `9 kHz–30 MHz`, `1–6 GHz`. No thin gap here: the
 * published band names (CISPR 16-1-1) have none.
 */
export function formatFrequencyRange(fromHz: number, toHz: number): string {
  const from = fromHz >= 1e9 ? GHZ : fromHz >= 150_000 ? MHZ : KHZ;
  const to = from !== KHZ ? from : toHz >= 1e9 ? GHZ : toHz > 150_000 ? MHZ : KHZ;
  const low = formatTrimmed(fromHz / from.hz, 3);
  const high = formatTrimmed(toHz / to.hz, 3);
  if (from !== to) return `${low} ${from.unit}–${high} ${to.unit}`;
  return low === high ? `${low} ${from.unit}` : `${low}–${high} ${from.unit}`;
}

const KHZ = { hz: 1e3, unit: 'kHz' };
const MHZ = { hz: 1e6, unit: 'MHz' };
const GHZ = { hz: 1e9, unit: 'GHz' };
