import { cautionText, comparisonFinding, formatMove, namesBeside, verdictsBeside } from '@/format/comparison';
import { changeText } from '@/format/changes';
import { findingText } from '@/format/finding';
import { caution } from '@/schemas/comparison';

const run = (label: string, trial: string | null = null, number = 'R-26-032') => ({ number, trial, state: { label } });
const NAMES = { a: 'M1', b: 'M2' };

test('runs are called by their states, a trial by what was tried, two of one state by their numbers', () => {
  expect(namesBeside(run('M1'), run('M2'))).toEqual(NAMES);
  expect(namesBeside(run('M2'), run('M2', 'foil on lid'))).toEqual({ a: 'M2', b: 'M2 with foil on lid' });
  expect(namesBeside(run('M2'), run('M2', null, 'R-26-033'))).toEqual({ a: 'R-26-032', b: 'R-26-033' });
});

test('a move is never a bare sign', () => {
  expect([-8.1, 2, 0.04, -0.04, 0].map(formatMove)).toEqual([
    '8.1 lower',
    '2.0 higher',
    '0.0 the same',
    '0.0 the same',
    '0.0 the same',
  ]);
});

const at = (mhz: number, movedDb: number | null) => ({ frequencyHz: mhz * 1e6, movedDb });

test.each([
  [[at(144.018, -6.1), at(0.585, 0.3)], 'M2 beside M1: 6.1 dB lower at 144.018 MHz; 0.3 dB higher at 0.585 MHz.'],
  [[at(144.018, -6.1), at(200, -1)], 'M2 beside M1: 6.1 dB lower at 144.018 MHz.'],
  [[at(144.018, 1), at(200, 3)], 'M2 beside M1: 3.0 dB higher at 200.000 MHz.'],
  [[at(144.018, 0.04)], 'M2 beside M1: no emission moved by 0.1 dB.'],
  [[at(144.018, null)], 'M2 beside M1: no emission was read in both, so nothing moved.'],
  [[], 'M2 beside M1: no emission was read in both, so nothing moved.'],
])('the finding tells the largest move either way: %j', (emissions, said) => {
  expect(findingText(comparisonFinding(NAMES, emissions))).toBe(said);
});

test('what both runs are is said in one sentence', () => {
  expect(verdictsBeside(NAMES, { a: 'over', b: 'inconclusive' })).toBe('M2 is inconclusive, M1 is over.');
  expect(verdictsBeside(NAMES, { a: 'over', b: 'over' })).toBe('M2 is over, and so is M1.');
  expect(verdictsBeside(NAMES, { a: 'needs-final', b: 'needs-final' })).toBe('M2 needs a final, and so does M1.');
});

test('every caution of the API has its sentence', () => {
  const values: Record<string, [string | number | null, string | number | null]> = {
    unit: ['dBuV', 'dBuV/m'],
    overlap: [30e6, 1e9],
    detector: ['peak', 'quasi-peak'],
    'no-counterpart': ['Average', null],
    rbw: [120e3, null],
    step: [75e3, null],
    position: ['horizontal', 'vertical'],
    height: ['swept', 1],
    distance: [3, 10],
    path: ['P-3 revision 1', null],
    limits: ['A, revision 1', 'A, revision 2'],
    mode: ['full light', 'dimmed'],
    partial: ['R-26-001', null],
    voided: ['R-26-001', 'R-26-002'],
    'no-overlap': [null, null],
  };
  const said = caution.shape.what.options.map((what) => {
    const [a, b] = values[what]!;
    return cautionText({ what, a, b }, NAMES);
  });
  for (const sentence of said) expect(sentence).toMatch(/^[A-Z].*\.$/);
  expect(said).toContain('M1 in peak, M2 in quasi-peak: the difference holds that of the detectors too.');
  expect(said).toContain('M1 with the height varied, M2 at 1.00 m: the field is another at another height.');
});

test('a change says what stands now and what stood before', () => {
  expect(changeText({ name: 'state', before: 'M1', after: 'M2' })).toBe('State: M2, before that M1');
  expect(changeText({ name: 'stateReason', before: null, after: 'accepted' })).toBe('Reason: accepted');
  expect(changeText({ name: 'firmware', before: '1.1', after: '' })).toBe('Firmware: nothing, before that 1.1');
  expect(changeText({ name: 'verdict', before: 'over', after: 'needs-final' })).toBe(
    'Verdict: needs a final, before that over',
  );
});
