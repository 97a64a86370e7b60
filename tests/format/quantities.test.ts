import {
  formatAzimuth,
  formatBytes,
  formatCount,
  formatDb,
  formatDistance,
  formatFigure,
  formatHeight,
  formatLevel,
  formatMargin,
  formatMarginDb,
  formatMarginInterval,
  formatTrimmed,
  formatUncertainty,
  marginText,
  unitLabel,
} from '@/format/quantities';
import { LEVEL_UNITS, LINE_UNITS } from '@/emc/kinds';

const GAP = '\u202f';

describe('margins carry their word, never a bare sign (design, known differences)', () => {
  test.each([
    [2.6, '2.6 under'],
    [-6.2, '6.2 over'],
    [0, '0.0 on the limit'],
    [-0, '0.0 on the limit'],
    [-0.04, '0.0 on the limit'],
    [0.04, '0.0 on the limit'],
    [-0.06, '0.1 over'],
    [0.06, '0.1 under'],
    [-12.34, '12.3 over'],
    [99.96, '100.0 under'],
  ])('%d dB reads %s', (marginDb, text) => expect(formatMargin(marginDb)).toBe(text));

  test('no sign of any kind is ever written', () => {
    for (let m = -40; m <= 40; m += 0.013) expect(formatMargin(m)).toMatch(/^\d+\.\d (under|over|on the limit)$/);
  });
  test('with its unit', () => expect(formatMarginDb(2.6)).toBe('2.6 dB under'));
  test('in two parts for a table', () => expect(marginText(-6.2)).toEqual({ figure: '6.2', word: 'over' }));
  test('the interval of the design picture: 2.6 under with ±4.9 dB', () =>
    expect(formatMarginInterval(2.6, 4.9)).toBe('7.5 under to 2.3 over'));
});

describe('figures', () => {
  test('minus is U+2212', () => expect(formatDb(-31.1)).toBe('\u221231.1'));
  test('nothing rounds to minus zero', () => expect(formatDb(-0.04)).toBe('0.0'));
  test('rounding is symmetric', () => {
    expect(formatDb(0.25)).toBe('0.3');
    expect(formatDb(-0.25)).toBe('\u22120.3');
  });
  test('thousands take a thin gap', () => {
    expect(formatCount(999)).toBe('999');
    expect(formatCount(7709)).toBe(`7${GAP}709`);
    expect(formatCount(12934)).toBe(`12${GAP}934`);
    expect(formatCount(1000000)).toBe(`1${GAP}000${GAP}000`);
    expect(formatFigure(-1234.56, 1)).toBe(`\u22121${GAP}234.6`);
  });
  test.each([NaN, Infinity, -Infinity, 1e21])('%d is no figure and throws', (value) => {
    expect(() => formatDb(value)).toThrow(RangeError);
    expect(() => formatMargin(value)).toThrow(RangeError);
  });
  test('settings lose idle zeros', () => {
    expect(formatTrimmed(120, 3)).toBe('120');
    expect(formatTrimmed(62.5, 3)).toBe('62.5');
    expect(formatTrimmed(0, 3)).toBe('0');
    expect(formatTrimmed(-0.0004, 3)).toBe('0');
  });
});

describe('units in the form of the trade', () => {
  test('micro is U+00B5, which both faces of the page draw', () => expect(unitLabel('dBuV/m')).toBe('dB\u00b5V/m'));
  test.each([...LEVEL_UNITS, ...LINE_UNITS])('%s has a label without a u for micro', (unit) =>
    expect(unitLabel(unit)).not.toMatch(/u/),
  );
  test('level', () => expect(formatLevel(37.44, 'dBuV/m')).toBe('37.4 dB\u00b5V/m'));
  test('linear level', () => expect(formatLevel(1.5, 'uV')).toBe('1.500 \u00b5V'));
  test('uncertainty', () => expect(formatUncertainty(4.94)).toBe('±4.9 dB'));
  test('height, distance, azimuth', () => {
    expect(formatHeight(2.1)).toBe('2.10');
    expect(formatDistance(3)).toBe('3 m');
    expect(formatDistance(0.8)).toBe('0.8 m');
    expect(formatAzimuth(48)).toBe('048');
    expect(formatAzimuth(359.6)).toBe('000');
    expect(formatAzimuth(360)).toBe('000');
  });
});

test.each([
  [0, '0 B'],
  [812, '812 B'],
  [421_000, '421 kB'],
  [999_499, '999 kB'],
  [999_500, '1.0 MB'],
  [1_440_000, '1.4 MB'],
  [999_949_999, '999.9 MB'],
  [999_950_000, '1.0 GB'],
])('%d bytes read %s', (bytes, text) => expect(formatBytes(bytes)).toBe(text));
