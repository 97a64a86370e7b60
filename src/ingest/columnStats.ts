/** What one column of numbers looks like, in file order. Rows are 0-based within the stretch; holes (NaN) are skipped. */
export interface ColumnStats {
  count: number;
  holes: number;
  first: number;
  last: number;
  min: number;
  minRow: number;
  max: number;
  maxRow: number;
  rising: number;
  falling: number;
  equal: number;
}

export function statsOf(values: Float64Array): ColumnStats {
  const stats = { count: 0, holes: 0, first: 0, last: 0, min: Infinity, minRow: 0, max: -Infinity, maxRow: 0 };
  let rising = 0;
  let falling = 0;
  let equal = 0;
  let before = NaN;
  for (let row = 0; row < values.length; row++) {
    const value = values[row]!;
    if (value !== value) {
      stats.holes++;
      continue;
    }
    if (stats.count++ === 0) stats.first = value;
    else if (value > before) rising++;
    else if (value < before) falling++;
    else equal++;
    if (value < stats.min) {
      stats.min = value;
      stats.minRow = row;
    }
    if (value > stats.max) {
      stats.max = value;
      stats.maxRow = row;
    }
    before = value;
  }
  stats.last = before;
  return { ...stats, rising, falling, equal };
}

/** Median by Hoare's selection; reorders `values`. */
export function medianOf(values: Float64Array): number {
  const middle = values.length >> 1;
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1]!;
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i <= j) {
        const swap = values[i]!;
        values[i++] = values[j]!;
        values[j--] = swap;
      }
    }
    if (middle <= j) high = j;
    else if (middle >= i) low = i;
    else break;
  }
  return values[middle] ?? 0;
}

export interface Steps {
  /** Median distance between neighbours, without sign. */
  step: number;
  even: boolean;
  /** Values that were there before, wherever. */
  duplicates: number;
  ascending: boolean;
}

function isEven(values: Float64Array, step: number): boolean {
  const within = 1e-6 * step;
  for (let i = 1; i < values.length; i++) {
    if (!(Math.abs(Math.abs(values[i]! - values[i - 1]!) - step) <= within)) return false;
  }
  return true;
}

export function stepsOf(values: Float64Array, stats: ColumnStats): Steps {
  const n = values.length;
  const oneWay = stats.rising === 0 || stats.falling === 0;
  const mean = n > 1 ? Math.abs(stats.last - stats.first) / (n - 1) : 0;
  const even = oneWay && n > 1 && isEven(values, mean);
  let step = mean;
  if (!even && n > 1) {
    const distances = new Float64Array(n - 1);
    for (let i = 1; i < n; i++) distances[i - 1] = Math.abs(values[i]! - values[i - 1]!);
    step = medianOf(distances);
  }
  let duplicates = stats.equal;
  if (!oneWay) {
    const sorted = Float64Array.from(values).sort();
    duplicates = 0;
    for (let i = 1; i < n; i++) if (sorted[i] === sorted[i - 1]) duplicates++;
  }
  return { step, even, duplicates, ascending: n > 1 && stats.rising === n - 1 };
}

/** A running number: nearly every value is the one before it plus one. */
export function countsRows(values: Float64Array): boolean {
  let ones = 0;
  for (let i = 1; i < values.length; i++) if (values[i]! - values[i - 1]! === 1) ones++;
  return values.length >= 3 && ones >= 0.6 * (values.length - 1) && Number.isInteger(values[0]!);
}
