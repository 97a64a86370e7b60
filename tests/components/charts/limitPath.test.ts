import {
  cutPolyline,
  flattened,
  guardBands,
  limitPolylines,
  segmentAt,
  stepsIn,
  upperEnvelope,
} from '@/components/charts/limitPath';
import { limitLabels } from '@/components/charts/limitLabels';
import { plotScale } from '@/components/charts/scale';
import published from '@fixtures/published/limits.json';
import { publishedLine } from './lines';

const MAINS = { fromHz: 150e3, toHz: 30e6 };
const RADIATED = { fromHz: 30e6, toHz: 1e9 };
const quasiPeakId = 'fcc15107a-qp';
const quasiPeak = publishedLine(quasiPeakId);
const average = publishedLine('fcc15107a-av');
const classB = publishedLine('cispr32-b-re-3m');

describe('drawn limit lines (47 CFR 15.107(a) and CISPR 32 class B at 3 m, fixtures/published/limits.json)', () => {
  test('a slope over log f is one straight chord: 66 to 56 from 0.15 to 0.5 MHz', () => {
    const [points] = limitPolylines(quasiPeak, { fromHz: 150e3, toHz: 500e3 });
    expect(points).toEqual([
      { hz: 150e3, value: 66 },
      { hz: 500e3, value: 56 },
    ]);
    expect(segmentAt(quasiPeak.segments[0]!, Math.sqrt(150e3 * 500e3))).toBeCloseTo(61, 9);
  });

  const points = published.evaluationPoints.rows.filter((row) => row.lineId === quasiPeakId && !row.atBandEdge);
  test.each(points)('$freqMHz MHz is drawn at $limit (computed points of fixtures/published/limits.json)', (row) => {
    const hz = row.freqMHz * 1e6;
    const [before, at] = limitPolylines(quasiPeak, { fromHz: Math.min(hz, 29e6), toHz: 30e6 })[0]!;
    expect(before!.hz <= hz && at !== undefined).toBe(true);
    expect(before!.value).toBeCloseTo(row.limit!, 4);
  });

  test('a step has both values at its frequency: 56 and 60 at 5 MHz', () => {
    const [points, ...rest] = limitPolylines(quasiPeak, MAINS);
    expect(rest).toEqual([]);
    expect(points!.filter(({ hz }) => hz === 5e6).map(({ value }) => value)).toEqual([56, 60]);
    expect(stepsIn([quasiPeak], MAINS)).toEqual([5e6]);
    expect(stepsIn([classB], RADIATED)).toEqual([230e6]);
  });

  test('a window cuts the line at its own edges, on the slope', () => {
    const [points] = limitPolylines(quasiPeak, { fromHz: 200e3, toHz: 400e3 });
    expect(points!.map(({ hz }) => hz)).toEqual([200e3, 400e3]);
    expect(points![0]!.value).toBeCloseTo(66 - (10 * Math.log(200 / 150)) / Math.log(500 / 150), 9);
  });

  test('outside its segments nothing is drawn, and a hole stays a hole', () => {
    expect(limitPolylines(classB, { fromHz: 1e6, toHz: 20e6 })).toEqual([]);
    const holed = { segments: [classB.segments[0]!, { ...classB.segments[1]!, startHz: 300e6 }] };
    expect(limitPolylines(holed, RADIATED)).toHaveLength(2);
  });

  test('a limit over linear frequency bends on the log axis: 45 to 55 dBpW, 30 to 300 MHz (CISPR 14-1, from memory)', () => {
    const power = publishedLine('cispr14-power-qp');
    const [points] = limitPolylines(power, { fromHz: 30e6, toHz: 300e6 });
    expect(points!.length).toBeGreaterThan(10);
    for (const { hz, value } of points!) expect(value).toBeCloseTo(45 + ((hz - 30e6) / 270e6) * 10, 9);
    expect(segmentAt(power.segments[0]!, 165e6)).toBeCloseTo(50, 9);
  });
});

describe('several lines at once', () => {
  test('above the higher of the two a level is over whichever line it hangs from', () => {
    expect(upperEnvelope([average, quasiPeak], MAINS)).toEqual(limitPolylines(quasiPeak, MAINS));
  });

  test('each line is the highest where the other has none', () => {
    const envelope = upperEnvelope([classB, quasiPeak], { fromHz: 150e3, toHz: 1e9 });
    expect(envelope).toHaveLength(1);
    expect(envelope[0]!.at(-1)).toEqual({ hz: 1e9, value: 47 });
    expect(envelope[0]![0]).toEqual({ hz: 150e3, value: 66 });
  });

  test('in the margin chart every stretch with a limit lies at 0', () => {
    expect(flattened(limitPolylines(classB, RADIATED))).toEqual([
      [
        { hz: 30e6, value: 0 },
        { hz: 1e9, value: 0 },
      ],
    ]);
  });
});

describe('guard band', () => {
  const steps = [
    { startHz: 30e6, stopHz: 200e6, expandedDb: 4.9 },
    { startHz: 200e6, stopHz: 1e9, expandedDb: 5.1 },
  ];

  test('follows the limit over its step, one piece per uncertainty step', () => {
    const bands = guardBands(limitPolylines(classB, RADIATED), steps);
    expect(bands.map(({ expandedDb }) => expandedDb)).toEqual([4.9, 5.1]);
    expect(bands[1]!.upper.map(({ value }) => value)).toEqual([45.1, 45.1, 52.1, 52.1]);
    expect(bands[1]!.lower.at(-1)).toEqual({ hz: 1e9, value: 41.9 });
  });

  test('there is none where U is not known', () => {
    const bands = guardBands(limitPolylines(classB, RADIATED), [steps[0]!]);
    expect(bands).toHaveLength(1);
    expect(bands[0]!.upper.at(-1)!.hz).toBe(200e6);
    expect(guardBands(limitPolylines(classB, RADIATED), [])).toEqual([]);
  });

  test('a cut on a slope lies on the slope', () => {
    const cut = cutPolyline(limitPolylines(quasiPeak, MAINS)[0]!, 200e3, 1e6);
    expect(cut[0]!.value).toBeCloseTo(segmentAt(quasiPeak.segments[0]!, 200e3), 9);
    expect(cut.at(-1)).toEqual({ hz: 1e6, value: 56 });
  });
});

describe('values riding on the line', () => {
  const scaleOf = (span: typeof MAINS) =>
    plotScale({ width: 990, height: 316, left: 46, right: 10, top: 30, bottom: 46 }, span, { top: 12, bottom: -38 });
  const place = (span: typeof MAINS, rightPx = 980, taken: [number, number][] = []) => ({
    span,
    x: scaleOf(span).x,
    hz: scaleOf(span).hz,
    rightPx,
    sizePx: 12.5,
    taken,
  });
  const texts = (labels: { text: string }[]) => labels.map(({ text }) => text);

  test('one text per stretch between two steps; the first says limit', () => {
    expect(texts(limitLabels([classB], false, place(RADIATED)))).toEqual(['limit 40 dBµV/m', '47 dBµV/m']);
  });

  test('two lines are told apart, and a change of slope at 0.5 MHz asks for no text of its own', () => {
    expect(texts(limitLabels([quasiPeak, average], true, place(MAINS)))).toEqual([
      'limit QP 66 to 56, AV 56 to 46 dBµV',
      'QP 60, AV 50 dBµV',
    ]);
  });

  test('a text moves behind a mark in its way, and is left out where there is no room', () => {
    const [moved] = limitLabels([classB], false, place(RADIATED, 980, [[60, 74]]));
    expect(moved!.x).toBeGreaterThanOrEqual(74);
    expect(texts(limitLabels([classB], false, place({ fromHz: 30e6, toHz: 231e6 })))).toEqual(['limit 40 dBµV/m']);
  });
});
