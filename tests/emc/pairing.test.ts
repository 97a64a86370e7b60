import type { Detector } from '@/emc/kinds';
import { hangingLines, ownLine, tracesFor, type PairableTrace } from '@/emc/pairing';
import { publishedLine } from './given';

const QP = publishedLine('cispr32-b-ce-qp');
const AV = publishedLine('cispr32-b-ce-av');
const RE_QP = publishedLine('cispr32-b-re-3m');
const RE_AV = publishedLine('cispr32-b-re-1g-av');
const RE_PK = publishedLine('cispr32-b-re-1g-pk');

const mains = (...detectors: Detector[]): PairableTrace[] =>
  detectors.map((detector, index) => ({ index, detector, levelUnit: 'dBuV', lowestHz: 150e3, highestHz: 30e6 }));
const radiated = (detector: Detector, lowestMhz: number, highestMhz: number): PairableTrace => ({
  index: 0,
  detector,
  levelUnit: 'dBuV/m',
  lowestHz: lowestMhz * 1e6,
  highestHz: highestMhz * 1e6,
});
const chosen = (line: typeof QP, ...detectors: Detector[]) => tracesFor(line, mains(...detectors)).map((t) => t.index);

describe('which traces judge a line', () => {
  test.each<[string, typeof QP, Detector[], number[]]>([
    ['its own detector before any other', QP, ['peak', 'quasi-peak', 'average'], [1]],
    ['its own detector before any other', AV, ['peak', 'quasi-peak', 'average'], [2]],
    ['peak for a quasi-peak line without quasi-peak', QP, ['average', 'peak'], [1]],
    ['peak for an average line without average', AV, ['unknown', 'peak'], [1]],
    ['quasi-peak, nearer, before peak for an average line', AV, ['peak', 'quasi-peak'], [1]],
    ['the detector below when none is above', QP, ['average', 'rms-average'], [0]],
    ['one kind that proves nothing when there is nothing else', QP, ['negative-peak', 'sample'], [1]],
    ['every trace of the chosen kind', QP, ['quasi-peak', 'average', 'quasi-peak'], [0, 2]],
    ['none without traces', QP, [], []],
  ])('%s', (_, line, detectors, expected) => {
    expect(chosen(line, ...detectors)).toEqual(expected);
  });

  test('a trace in another unit, without a level, or without a point in the range is never asked', () => {
    const [trace] = mains('quasi-peak');
    expect(tracesFor(QP, [{ ...trace!, levelUnit: 'dBuV/m' }])).toEqual([]);
    expect(tracesFor(QP, [{ ...trace!, levelUnit: null }])).toEqual([]);
    expect(tracesFor(QP, [{ ...trace!, lowestHz: 31e6, highestHz: 1e9 }])).toEqual([]);
    expect(tracesFor(RE_PK, [radiated('peak', 30, 999.99)])).toEqual([]);
  });
});

describe('an edge in common is no reach', () => {
  const reached = (line: typeof QP, from: number, to: number) => tracesFor(line, [radiated('peak', from, to)]).length;
  test('a sweep that ends where the line begins, or begins where it ends, does not reach it', () => {
    expect(reached(RE_PK, 30, 1000)).toBe(0);
    expect(reached(RE_PK, 30, 1000 + 1e-10)).toBe(0);
    expect(reached(RE_QP, 1000, 6000)).toBe(0);
    expect(reached(RE_PK, 30, 1000.1)).toBe(1);
  });

  test('one that begins below and ends at the end of the line reaches it, and so does one that begins at its start', () => {
    expect(reached(RE_QP, 20, 1000)).toBe(1);
    expect(reached(RE_QP, 30, 40)).toBe(1);
    expect(reached(RE_QP, 999, 1000)).toBe(1);
    expect(reached(RE_PK, 1000, 6000)).toBe(1);
  });

  test('a reading at one frequency reaches every line with a limit there', () => {
    expect(reached(RE_QP, 1000, 1000)).toBe(1);
    expect(reached(RE_PK, 1000, 1000)).toBe(1);
    expect(reached(RE_PK, 999, 999)).toBe(0);
  });
});

describe('which line a trace hangs from', () => {
  test.each<[Detector, string]>([
    ['quasi-peak', 'quasi-peak'],
    ['peak', 'quasi-peak'],
    ['average', 'average'],
    ['log-average', 'average'],
    ['unknown', 'quasi-peak'],
  ])('on mains %s hangs from the %s line', (detector, line) => {
    expect(ownLine(mains(detector)[0]!, [AV, QP])?.detector).toBe(line);
  });

  test('above 1 GHz peak hangs from the peak line, average from the average line', () => {
    const lines = [RE_QP, RE_AV, RE_PK];
    expect(ownLine(radiated('peak', 1000, 6000), lines)).toBe(RE_PK);
    expect(ownLine(radiated('average', 1000, 6000), lines)).toBe(RE_AV);
    expect(ownLine(radiated('peak', 30, 999), lines)).toBe(RE_QP);
  });

  test('without a line in its unit or range a trace hangs from none', () => {
    expect(ownLine(radiated('peak', 30, 1000), [QP, AV])).toBeNull();
    expect(ownLine(radiated('peak', 7000, 8000), [RE_QP, RE_PK])).toBeNull();
    expect(hangingLines('peak', null, [QP])).toEqual([]);
  });
});
