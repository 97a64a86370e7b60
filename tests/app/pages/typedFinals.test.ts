import {
  bodyOf,
  finalOf,
  isTouched,
  NOTHING_TYPED,
  tunedApart,
  tunedHz,
  typedFigure,
  wrongIn,
} from '@/app/(lab)/finals/typedFinals';
import type { AskedFinal, FinalsSheetView } from '@/schemas/finals';

const asked: AskedFinal = {
  ...{ key: 'horizontal-a', kind: 'peak', frequencyHz: 144_018_000, fromHz: 144_018_000, toHz: 144_018_000 },
  ...{ rbwHz: 120e3, detectors: ['quasi-peak', 'average'], retests: [], heightM: null, azimuthDeg: null },
};
const row = (change: Partial<typeof NOTHING_TYPED>) => ({ ...NOTHING_TYPED, ...change });
const read = (text: string, change: Partial<typeof NOTHING_TYPED> = {}) =>
  row({ levels: { 'quasi-peak': text }, ...change });

test.each([
  ['41,2', 41.2],
  ['41.2', 41.2],
  [' 41. ', 41],
  ['−3,5', -3.5],
  ['-3', -3],
  ['', null],
  ['41,2 dB', NaN],
  ['4.1.2', NaN],
  ['1e3', NaN],
])('a figure is typed with a comma or a point: %p is %p', (text, figure) => {
  expect(typedFigure(text)).toEqual(figure);
});

test('a frequency that nobody touched is the one asked for, to the hertz; typed it is in MHz or as it says', () => {
  expect(tunedHz(NOTHING_TYPED, asked)).toBe(144_018_000);
  expect(tunedHz(row({ frequency: '144,0205' }), asked)).toBe(144_020_500);
  expect(tunedHz(row({ frequency: '144020.5 kHz' }), asked)).toBe(144_020_500);
  expect(tunedHz(row({ frequency: '1\u202f044.5' }), asked)).toBe(1_044_500_000);
  expect(tunedHz(row({ frequency: 'x' }), asked)).toBeNull();
});

test('a row is sent once it holds a reading and nothing in it is wrong', () => {
  expect(finalOf(undefined, asked)).toBeNull();
  expect(finalOf(row({ height: '1.2' }), asked)).toBeNull();
  expect(finalOf(read('41,2', { height: 'high' }), asked)).toBeNull();
  expect(finalOf(read('41,2', { height: '1,25', azimuth: '75', remark: ' lid on ' }), asked)).toEqual({
    ...{ retestIds: [], frequencyHz: 144_018_000, rbwHz: 120e3, readAt: null },
    ...{ readings: [{ detector: 'quasi-peak', level: 41.2 }], heightM: 1.25, azimuthDeg: 75, remark: 'lid on' },
  });
});

test('what is wrong stands at its cell, and an empty cell is never wrong', () => {
  expect(wrongIn(NOTHING_TYPED, asked)).toEqual({});
  const wrong = wrongIn(read('4l', { frequency: '', height: '11', azimuth: '361' }), asked);
  expect(Object.keys(wrong).sort()).toEqual(['azimuth', 'frequency', 'height', 'quasi-peak']);
  expect(wrongIn(read('301'), asked)).toEqual({ 'quasi-peak': 'no level of a receiver' });
});

test('leaving asks for anything typed, not for a cell that was emptied again', () => {
  expect(isTouched(NOTHING_TYPED)).toBe(false);
  expect(isTouched(read(' '))).toBe(false);
  expect(isTouched(read('4'))).toBe(true);
  expect(isTouched(row({ remark: 'lid' }))).toBe(true);
});

test('half the bandwidth away it still is the emission; further off it settles nothing', () => {
  expect(tunedApart(read('41', { frequency: '144.078' }), asked)).toBeNull();
  expect(tunedApart(read('41', { frequency: '144.079' }), asked)).toContain('settles nothing');
});

test('a body names the position; what the reading holds already goes with the path it was said of', () => {
  const sheet = {
    ...{ port: 'ac-mains', state: { id: 's', label: 'M0' } },
    positions: [{ position: 'L1', finals: [asked] }],
    proposed: {
      ...{ pathId: 'p', limitSet: { id: 'l', name: '' }, distanceM: null, operatingMode: 'on' },
      ...{ valuesHold: 'receiver-input', unit: 'dBuV', alreadyCorrected: ['LIM-1'], heightSwept: false },
    },
  } as unknown as FinalsSheetView;
  const setting = { pathId: 'p', reading: 'dBuV' as const, operatingMode: 'on', heightSwept: true };
  const [position] = sheet.positions as [(typeof sheet.positions)[number]];
  expect(bodyOf(sheet, position, {}, setting)).toBeNull();
  const typed = { [asked.key]: read('41') };
  expect(bodyOf(sheet, position, typed, setting)).toMatchObject({
    keys: ['horizontal-a'],
    body: { line: 'L1', polarisation: null, alreadyCorrected: ['LIM-1'], heightSwept: false, unit: 'dBuV' },
  });
  expect(bodyOf(sheet, position, typed, { ...setting, pathId: 'q' })!.body.alreadyCorrected).toEqual([]);
});
