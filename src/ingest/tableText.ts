import type { FactorQuantity, LineUnit } from '@/emc/kinds';
import type { LimitSegment } from '@/emc/types';

/*
 * Revisions written out as text, so that what is downloaded can be uploaded again and is the same, bit for bit:
 * figures stand in the shortest form that reads back to the same Float64, frequencies in hertz, columns apart by
 * semicolons, with what describes them before the headings.
 */

/** A cell that cannot end its row or its column; line ends become blanks. */
function cell(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  return /[";]/.test(line) ? `"${line.replaceAll('"', '""')}"` : line;
}

function text(described: [string, string | null][], headings: string[], rows: string[]): string {
  const before = described.flatMap(([word, value]) =>
    value === null || value === '' ? [] : [`${word};${cell(value)}`],
  );
  return [...before, headings.join(';'), ...rows, ''].join('\r\n');
}

const QUANTITY_HEADINGS: Record<FactorQuantity, string> = {
  'antenna-factor': 'Antenna factor (dB/m)',
  loss: 'Loss (dB)',
  gain: 'Gain (dB)',
  'amn-voltage-division': 'AMN voltage division factor (dB)',
  'aan-voltage-division': 'AAN voltage division factor (dB)',
  'transfer-impedance': 'Transfer impedance (dBohm)',
  'magnetic-antenna-factor': 'Magnetic antenna factor (dB(S/m))',
  'clamp-factor': 'Clamp factor (dB(pW/uV))',
};

export interface WrittenFactorTable {
  name: string;
  quantity: FactorQuantity;
  polarisation: string | null;
  distanceM: number | null;
  frequencyHz: readonly number[];
  valueDb: readonly number[];
  source: string;
}

export function factorTableText(table: WrittenFactorTable): string {
  const { name, quantity, polarisation, distanceM, source } = table;
  return text(
    [
      ['Table', name],
      ['Quantity', quantity.replaceAll('-', ' ')],
      ['Polarisation', polarisation],
      ['Distance', distanceM === null ? null : `${distanceM} m`],
      ['Source', source],
    ],
    ['Frequency (Hz)', QUANTITY_HEADINGS[quantity]],
    table.frequencyHz.map((hz, i) => `${hz};${table.valueDb[i]}`),
  );
}

export interface WrittenLimitLine {
  key: string;
  name: string;
  document: string;
  class: string;
  port: string;
  detector: string;
  bandwidthHz: number;
  unit: LineUnit;
  distanceM: number | null;
  source: string;
  basis: string;
  segments: readonly LimitSegment[];
}

export function limitLineText(line: WrittenLimitLine): string {
  return text(
    [
      ['Limit line', line.name],
      ['Key', line.key],
      ['Document', line.document],
      ['Class', line.class],
      ['Port', line.port],
      ['Detector', line.detector],
      ['Bandwidth', `${line.bandwidthHz} Hz`],
      ['Unit', line.unit],
      ['Distance', line.distanceM === null ? null : `${line.distanceM} m`],
      ['Source', line.source],
      ['Basis', line.basis],
    ],
    ['Start (Hz)', 'Stop (Hz)', `Limit at start (${line.unit})`, `Limit at stop (${line.unit})`, 'Straight in'],
    line.segments.map(
      ({ startHz, stopHz, startLimit, stopLimit, over }) =>
        `${startHz};${stopHz};${startLimit};${stopLimit};${over.replace('-', ' ')}`,
    ),
  );
}
