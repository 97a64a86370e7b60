import { segmentValue } from '@/app/(lab)/limits/limitWords';

const segment = { startHz: 30e6, stopHz: 300e6, startLimit: 45, stopLimit: 55, over: 'linear-frequency' as const };

test('a limit stands with its unit, and how it slopes after it (CISPR 14-1 Table 7, from memory)', () => {
  expect(segmentValue(segment, 'dBpW')).toBe('45.0 to 55.0 dBpW, straight in frequency');
  expect(segmentValue({ ...segment, stopLimit: 45 }, 'dBuA')).toBe('45.0 dBµA');
});
