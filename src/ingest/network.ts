import { IngestError } from './ingestError';
import type { OptionLine } from './prepare';
import { columnOf, lineOfRow } from './scan';
import type { CleanBytes } from './bytes';
import type { Table } from './table';

export interface NetworkTrace {
  name: 'S11' | 'S21' | 'S12' | 'S22';
  /** File column of the first of its two numbers. */
  column: number;
  /** Magnitude, 20·log10|S|. */
  valueDb: Float64Array;
}

/** Order of a two-port row in the published format: S11, S21, S12, S22, two numbers each. */
const TWO_PORT = ['S11', 'S21', 'S12', 'S22'] as const;

/**
 * Magnitudes of a two-port file in dB, from decibels, magnitude and angle, or real and imaginary part.
 * Parameters with a magnitude of zero are left out, since zero has no decibels.
 * @throws IngestError when S21 cannot be had
 */
export function networkTraces(clean: CleanBytes, table: Table, option: OptionLine): NetworkTrace[] {
  const { scan, pieces } = table;
  const piece = pieces[0]!;
  const line = table.main.firstLine;
  if (option.parameter !== 'S') {
    const message = `Line ${option.line}: ${option.parameter} parameters. Export S parameters.`;
    throw new IngestError(option.line, `${option.parameter} parameters`, 'S parameters', message);
  }
  if (scan.columns.length !== 9) {
    const found = `${scan.columns.length} numbers in a row`;
    const message = `Line ${line} holds ${found}; a two-port row holds 9. Only two-port files state a loss or gain.`;
    throw new IngestError(line, found, '9 numbers in a row', message);
  }
  return TWO_PORT.flatMap((name, i) => {
    const [a, b] = [1, 2].map((n) => columnOf(scan, 2 * i + n, piece.firstRow, piece.rows)) as [
      Float64Array,
      Float64Array,
    ];
    const valueDb =
      option.format === 'DB'
        ? a
        : option.format === 'MA'
          ? a.map((magnitude) => 20 * Math.log10(magnitude))
          : a.map((real, row) => 20 * Math.log10(Math.hypot(real, b[row]!)));
    const bad = valueDb.findIndex((value) => !Number.isFinite(value));
    if (bad < 0) return [{ name, column: 2 * i + 1, valueDb }];
    if (name !== 'S21') return [];
    const where = lineOfRow(clean, scan, piece.firstRow + bad);
    throw new IngestError(
      where,
      'S21 of zero or less',
      'a magnitude above zero',
      `Line ${where}: S21 has no decibels. Measure the part again.`,
    );
  });
}
