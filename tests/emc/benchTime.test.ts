import fc from 'fast-check';
import { BENCH_PARTS, benchTime, type BenchPlan, type FinalsPlan, type ScanPlan } from '@/emc/benchTime';

const once = { count: 1, changeS: 0 };
const scan = (more: Partial<ScanPlan> = {}): ScanPlan => ({
  name: '30-300 MHz',
  startHz: 30e6,
  stopHz: 300e6,
  bandwidthHz: 120e3,
  step: 'half the bandwidth',
  time: { scanS: 10 },
  setUpS: 0,
  lines: once,
  polarisations: once,
  heights: once,
  azimuths: once,
  ...more,
});
const finals = (more: Partial<FinalsPlan> = {}): FinalsPlan => ({
  name: 'finals',
  count: 6,
  changeS: 20,
  maximiseS: 90,
  detectors: [
    { detector: 'quasi-peak', measuringS: 15 },
    { detector: 'average', measuringS: 1 },
  ],
  read: 'one after another',
  ...more,
});
const plan = (more: Partial<BenchPlan> = {}): BenchPlan => ({ setUpS: 0, scans: [], finals: [], ...more });

describe('the breakdown', () => {
  test('two polarisations, four heights and sixteen azimuths are 128 scans with one change between each two', () => {
    const { lines, totalS } = benchTime(
      plan({
        setUpS: 600,
        scans: [
          scan({
            setUpS: 300,
            polarisations: { count: 2, changeS: 60 },
            heights: { count: 4, changeS: 15 },
            azimuths: { count: 16, changeS: 4 },
          }),
        ],
      }),
    );
    const name = '30-300 MHz';
    expect(lines).toEqual([
      { part: 'set-up', name: null, count: 1, eachS: 600, seconds: 600 },
      { part: 'range set-up', name, count: 1, eachS: 300, seconds: 300 },
      { part: 'polarisation change', name, count: 1, eachS: 60, seconds: 60 },
      { part: 'height change', name, count: 6, eachS: 15, seconds: 90 },
      { part: 'azimuth change', name, count: 120, eachS: 4, seconds: 480 },
      { part: 'scan', name, count: 128, eachS: 10, seconds: 1280 },
    ]);
    expect(totalS).toBe(600 + 300 + 60 + 90 + 480 + 1280);
  });

  test('four mains lines are four scans and three changes', () => {
    const { lines } = benchTime(plan({ scans: [scan({ lines: { count: 4, changeS: 45 } })] }));
    expect(lines.map(({ part, count, seconds }) => [part, count, seconds])).toEqual([
      ['line change', 3, 135],
      ['scan', 4, 40],
    ]);
  });

  test('finals are approached, maximised and read in one detector after another', () => {
    const { lines, totalS } = benchTime(plan({ finals: [finals()] }));
    expect(lines).toEqual([
      { part: 'final change', name: 'finals', count: 6, eachS: 20, seconds: 120 },
      { part: 'final maximising', name: 'finals', count: 6, eachS: 90, seconds: 540 },
      { part: 'final reading', name: 'finals', count: 6, eachS: 16, seconds: 96 },
    ]);
    expect(totalS).toBe(756);
  });

  test('detectors read at once take the longest of their times', () => {
    const { lines } = benchTime(plan({ finals: [finals({ read: 'at once' })] }));
    expect(lines[2]).toMatchObject({ part: 'final reading', eachS: 15, seconds: 90 });
  });

  test('what takes no time is no line, and nothing planned takes none', () => {
    expect(benchTime(plan())).toEqual({ lines: [], totalS: 0 });
    expect(benchTime(plan({ finals: [finals({ count: 0 })] })).lines).toEqual([]);
  });

  test('the lines add up, each is its count times its time, and there is one change fewer than scans (property)', () => {
    const positions = fc.record({ count: fc.integer({ min: 1, max: 6 }), changeS: fc.integer({ min: 1, max: 90 }) });
    const scans = fc.record({ lines: positions, polarisations: positions, heights: positions, azimuths: positions });
    fc.assert(
      fc.property(scans, fc.integer({ min: 0, max: 20 }), (of, count) => {
        const { lines, totalS } = benchTime(plan({ setUpS: 5, scans: [scan(of)], finals: [finals({ count })] }));
        expect(totalS).toBe(lines.reduce((sum, { seconds }) => sum + seconds, 0));
        for (const line of lines) {
          expect(line.seconds).toBe(line.count * line.eachS);
          expect(BENCH_PARTS).toContain(line.part);
        }
        const countOf = (part: RegExp) =>
          lines.filter((line) => part.test(line.part)).reduce((sum, line) => sum + line.count, 0);
        const { lines: l, polarisations, heights, azimuths } = of;
        expect(countOf(/^scan$/)).toBe(l.count * polarisations.count * heights.count * azimuths.count);
        expect(countOf(/^(line|polarisation|height|azimuth) change$/)).toBe(countOf(/^scan$/) - 1);
      }),
    );
  });

  test('two plans together take what each takes (property)', () => {
    const some = fc.array(fc.integer({ min: 1, max: 4 }), { minLength: 1, maxLength: 3 });
    fc.assert(
      fc.property(some, some, (a, b) => {
        const of = (counts: number[]) => counts.map((count) => scan({ heights: { count, changeS: 7 }, setUpS: 3 }));
        const [left, right] = [benchTime(plan({ scans: of(a) })), benchTime(plan({ scans: of(b) }))];
        expect(benchTime(plan({ scans: [...of(a), ...of(b)] })).totalS).toBe(left.totalS + right.totalS);
      }),
    );
  });
});

describe('what is no plan is refused by name', () => {
  const refused = (more: Partial<ScanPlan>, words: string) =>
    expect(() => benchTime(plan({ scans: [scan(more)] }))).toThrow(words);

  test('ranges, steps, bandwidths and times', () => {
    refused({ startHz: 0 }, '0 to 300000000 Hz');
    refused({ stopHz: 30e6 }, '30000000 to 30000000 Hz');
    refused({ stopHz: Infinity }, 'Infinity');
    for (const stepHz of [0, -1, NaN, Infinity]) refused({ step: { stepHz } }, `step of ${stepHz} Hz`);
    for (const bandwidthHz of [0, -1, NaN, Infinity]) refused({ bandwidthHz }, `bandwidth of ${bandwidthHz} Hz`);
    for (const wrong of [0, -1, NaN, Infinity]) {
      refused({ time: { dwellS: wrong } }, `${wrong} s is no time (dwell)`);
      refused({ time: { scanS: wrong } }, `${wrong} s is no time (scan)`);
      refused({ time: { secondsPerHz: wrong } }, `${wrong} s is no time (rate per hertz)`);
    }
    for (const wrong of [-1, NaN, Infinity]) {
      refused({ setUpS: wrong }, `${wrong} s is no time (range set-up)`);
      expect(() => benchTime(plan({ setUpS: wrong }))).toThrow(`${wrong} s is no time (set-up)`);
    }
  });

  test('counts of positions', () => {
    for (const kind of ['lines', 'polarisations', 'heights', 'azimuths'] as const) {
      for (const count of [0, -1, 1.5, NaN]) refused({ [kind]: { count, changeS: 0 } }, `${count} is no count`);
      refused({ [kind]: { count: 1, changeS: -1 } }, '-1 s is no time');
    }
  });

  test('finals', () => {
    const refusedFinal = (more: Partial<FinalsPlan>, words: string) =>
      expect(() => benchTime(plan({ finals: [finals(more)] }))).toThrow(words);
    for (const count of [-1, 0.5, NaN]) refusedFinal({ count }, `${count} is no count of finals`);
    refusedFinal({ detectors: [] }, 'without a detector');
    refusedFinal({ detectors: [{ detector: 'peak', measuringS: -1 }] }, '-1 s is no time (peak)');
    refusedFinal({ changeS: NaN }, 'final change');
    refusedFinal({ maximiseS: -2 }, 'final maximising');
  });
});
