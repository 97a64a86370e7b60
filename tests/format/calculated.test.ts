import { formatQuantity, formatSeconds, formatSignificant, writeQuantity } from '@/format/calculated';

test.each([
  [37.368, 'dBµV/m', 'level', '37.37 dBµV/m'],
  [-41.2, 'dBm', 'level', '−41.20 dBm'],
  [2.6, 'dB', 'margin', '2.6 dB under'],
  [-6.2, 'dB', 'margin', '6.2 dB over'],
  [0.2236068, 'V', 'scaled', '223.6 mV'],
  [4.7746e-6, 'A', 'scaled', '4.775 µA'],
  [3, 'm', 'scaled', '3 m'],
  [9.99996e-4, 'V', 'scaled', '1 mV'],
  [318.089677, 'm', 'scaled', '318.1 m'],
  [50, 'ohm', 'ratio', '50 ohm'],
  [0.090909, '', 'ratio', '0.09091'],
  [16167, '', 'count', '16\u202f167'],
  [144.018e6, 'Hz', 'frequency', '144.018 MHz'],
  [120e3, 'Hz', 'setting', '120 kHz'],
  [19400, 's', 'duration', '5 h 23 min'],
] as const)('%d %s as %s is %s', (value, unit, form, text) => {
  expect(formatQuantity({ value, unit, form })).toBe(text);
});

test.each([
  [0, '0'],
  [1.25663e-6, '1.257 × 10^−6'],
  [123456, '123\u202f500'],
  [0.00012346, '0.0001235'],
  [-0.5, '−0.5'],
  [9999.6, '10\u202f000'],
])('%d to four significant digits is %s', (value, text) => expect(formatSignificant(value)).toBe(text));

test.each([
  [0.97, '0.97 s'],
  [14.1, '14.1 s'],
  [59.94, '59.9 s'],
  [59.96, '1 min 00 s'],
  [2820, '47 min 00 s'],
  [3599.6, '1 h 00 min'],
  [5970, '1 h 40 min'],
])('%d s is %s', (s, text) => expect(formatSeconds(s)).toBe(text));

test('figure and unit come apart, and what has two units stays whole', () => {
  expect(writeQuantity({ value: 144.018e6, unit: 'Hz', form: 'frequency' })).toEqual({
    figure: '144.018',
    unit: 'MHz',
  });
  expect(writeQuantity({ value: 2820, unit: 's', form: 'duration' })).toEqual({ figure: '47 min 00 s', unit: '' });
});

test('what is no figure is a fault of the caller', () => {
  expect(() => formatQuantity({ value: NaN, unit: 'dB', form: 'level' })).toThrow(RangeError);
});
