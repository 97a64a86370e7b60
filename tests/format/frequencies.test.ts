import {
  formatBandwidth,
  formatFrequency,
  formatFrequencyKhz,
  formatFrequencyMhz,
  formatFrequencyRange,
} from '@/format/frequencies';

const GAP = '\u202f';

test('a reading in MHz keeps three decimals and takes a thin gap', () => {
  expect(formatFrequencyMhz(144_018_000)).toBe('144.018');
  expect(formatFrequencyMhz(36_006_000)).toBe('36.006');
  expect(formatFrequencyMhz(1e9)).toBe(`1${GAP}000.000`);
  expect(formatFrequencyKhz(9_000)).toBe('9.000');
});

test.each([
  [144_018_000, '144.018 MHz'],
  [585_000, '0.585 MHz'],
  [150_000, '0.150 MHz'],
  [149_000, '149.000 kHz'],
  [65_000, '65.000 kHz'],
  [999.96, '1.000 kHz'],
  [50, '50.0 Hz'],
])('%d Hz with its unit reads %s', (hz, text) => expect(formatFrequency(hz)).toBe(text));

test.each([
  [120_000, '120 kHz'],
  [9_000, '9 kHz'],
  [200, '200 Hz'],
  [1_000_000, '1 MHz'],
  [999_999.9, '1 MHz'],
  [62_500, '62.5 kHz'],
  [12_000_000, '12 MHz'],
  [24_576_000, '24.576 MHz'],
])('%d Hz as a setting reads %s', (hz, text) => expect(formatBandwidth(hz)).toBe(text));

test.each([
  [30e6, 1000e6, '30–1000 MHz'],
  [0.15e6, 30e6, '0.15–30 MHz'],
  [9e3, 30e6, '9 kHz–30 MHz'],
  [9e3, 150e3, '9–150 kHz'],
  [9e3, 1e9, '9 kHz–1 GHz'],
  [1e9, 6e9, '1–6 GHz'],
  [30e6, 608.175e6, '30–608.175 MHz'],
  [144.018e6, 144.018e6, '144.018 MHz'],
])('from %d to %d Hz reads %s', (from, to, text) => expect(formatFrequencyRange(from, to)).toBe(text));

test('an absent frequency is the caller’s null, not a figure', () => {
  expect(() => formatFrequency(NaN)).toThrow(RangeError);
  expect(() => formatFrequencyMhz(Infinity)).toThrow(RangeError);
});
