import type { LevelUnit } from '@/emc/kinds';

export type FrequencyUnit = 'Hz' | 'kHz' | 'MHz' | 'GHz';

/** Powers of ten to hertz. */
export const TO_HZ: Record<FrequencyUnit, number> = { Hz: 0, kHz: 3, MHz: 6, GHz: 9 };

/** Power spectral densities (`dBm/Hz`) are no levels and no frequencies. */
const DENSITY = /d\s?b\S*\s?\/\s?(?:[kmg]?hz|√)/i;

export function frequencyUnitIn(text: string): FrequencyUnit | null {
  if (DENSITY.test(text)) return null;
  const found = /(?:^|[^a-zµ])([kmg]?)hz(?![a-z])/i.exec(text) ?? /([kMG])Hz(?![a-z])/.exec(text);
  if (!found || found[1] === 'm') return found?.[0].endsWith('mhz') ? 'MHz' : null;
  return { '': 'Hz', k: 'kHz', m: 'MHz', g: 'GHz' }[found[1]!.toLowerCase()] as FrequencyUnit;
}

/** Units as written: `dBuV/m`, `dB(µV)`, `dBuVPerMeter`, `dBµV`; micro as U+00B5, U+03BC or u. */
const DECIBEL =
  /(?:^|[^a-z])db\s*(?:(µ|u|m|p|n|f)?\s*(v|a|w|t|pt)|(m))?\s*((?:1\s*)?\/\s*m(?![a-z])|per\s?met(?:er|re))?(?![a-z])/;

export interface WrittenUnit {
  /** `dB/m` is an antenna factor's; null when the unit is none that Stillfield holds. */
  unit: LevelUnit | 'dB/m' | null;
  written: string;
}

function decibelUnit(text: string): WrittenUnit | null {
  const found = DECIBEL.exec(text);
  if (!found) return null;
  const [, prefix = '', quantity = '', milliwatt, perMetre] = found;
  const written = found[0].replace(/^[^d]/, '').trim();
  if (milliwatt) return { unit: perMetre ? null : 'dBm', written };
  if (quantity === '') return { unit: perMetre ? 'dB/m' : 'dB', written };
  const micro = prefix === 'µ' || prefix === 'u';
  if (micro && quantity === 'v') return { unit: perMetre ? 'dBuV/m' : 'dBuV', written };
  if (micro && quantity === 'a') return { unit: perMetre ? 'dBuA/m' : 'dBuA', written };
  // `dB(pW/µV)` is the factor of an absorbing clamp.
  const ratio = /^\s*\/\s*[µu]?v/.test(text.slice(found.index + found[0].length));
  if (prefix === 'p' && quantity === 'w' && !perMetre && !ratio) return { unit: 'dBpW', written };
  return { unit: null, written };
}

/**
 * The level unit that a heading or a preamble cell states; null when it states none.
 * @param alone the text is known to be a unit, so a bare `V` is volts and not a polarisation
 */
export function levelUnitIn(text: string, alone = false): WrittenUnit | null {
  if (DENSITY.test(text)) return { unit: null, written: text.trim() };
  const plain = text
    .replace(/μ/g, 'µ')
    .replace(/Âµ/g, 'µ')
    .replace(/\bd\s+b(?=[([uµmVA])/i, 'db')
    .toLowerCase();
  const decibel = decibelUnit(plain.replace(/[()[\]]/g, ' '));
  if (decibel) return decibel;
  const linear = (alone ? /^[([\s]*([mµu]?)\s?(v|w)[)\]\s]*$/ : /[([]\s*([mµu]?)(v|w)\s*[)\]]/).exec(plain);
  if (!linear) return null;
  const unit = `${linear[1]!.replace('µ', 'u')}${linear[2]!.toUpperCase()}`;
  return { unit: unit === 'uW' ? null : (unit as LevelUnit), written: linear[0].trim() };
}

export function isLinear(unit: LevelUnit | null): boolean {
  return unit !== null && !unit.startsWith('dB');
}

/** Ends of the CISPR 16-1-1 bands and of the usual spans above them, in hertz. */
const BAND_ENDS = [9e3, 150e3, 30e6, 300e6, 1e9, 3e9, 6e9, 18e9, 26.5e9, 40e9];

/** The likeliest unit of bare frequencies; only ever a proposal. */
export function proposeFrequencyUnit(first: number, last: number): FrequencyUnit {
  const low = Math.min(first, last);
  const high = Math.max(first, last);
  const isEnd = (hz: number) => BAND_ENDS.some((end) => Math.abs(hz - end) <= 1e-6 * end);
  for (const unit of ['Hz', 'MHz', 'kHz', 'GHz'] as const) {
    const factor = 10 ** TO_HZ[unit];
    if (isEnd(low * factor) && isEnd(high * factor)) return unit;
  }
  const size = Math.max(Math.abs(low), Math.abs(high));
  return size >= 1e5 ? 'Hz' : size >= 10 ? 'MHz' : 'GHz';
}
