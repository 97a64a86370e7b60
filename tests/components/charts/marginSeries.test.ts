import fc from 'fast-check';
import { nearestColumn, seriesExtremes, traceSeries, type WindowTrace } from '@/components/charts/marginSeries';

const trace = (columns: [hz: number, low: number, high: number, limit: number | null][]): WindowTrace => ({
  index: 0,
  frequencyHz: columns.map(([hz]) => hz),
  levelMin: columns.map(([, low]) => low),
  levelMax: columns.map(([, , high]) => high),
  marginMin: columns.map(([, , high, limit]) => (limit === null ? null : limit - high)),
  marginMax: columns.map(([, low, , limit]) => (limit === null ? null : limit - low)),
});

const columns = fc
  .array(fc.tuple(fc.double({ min: -40, max: 120, noNaN: true }), fc.double({ min: 0, max: 30, noNaN: true })), {
    minLength: 1,
    maxLength: 60,
  })
  .map((pairs) => pairs.map(([low, by], i): [number, number, number, number] => [30e6 * 1.01 ** i, low, low + by, 40]));

describe('one trace as a line through its column extremes', () => {
  test('the margin chart draws dB over the limit: 37.4 against 40.0 is 2.6 under', () => {
    const points = traceSeries(trace([[36.006e6, 37.4, 37.4, 40]]), null, null, 'margin');
    expect(points).toHaveLength(1);
    expect(points[0]!.y).toBeCloseTo(-2.6, 12);
  });

  test('on the limit is 0 and not a negative zero', () => {
    expect(Object.is(traceSeries(trace([[30e6, 40, 40, 40]]), null, null, 'margin')[0]!.y, 0)).toBe(true);
  });

  test('property: every minimum and maximum is drawn, nothing else, in order of frequency', () => {
    fc.assert(
      fc.property(columns, (given) => {
        const drawn = traceSeries(trace(given), null, null, 'level');
        for (const [hz, low, high] of given) {
          const here = drawn.filter(({ x }) => x === hz).map(({ y }) => y);
          expect([...new Set(here)].sort((a, b) => a - b)).toEqual([...new Set([low, high])].sort((a, b) => a - b));
        }
        expect(drawn.every((point, i) => i === 0 || point.x >= drawn[i - 1]!.x)).toBe(true);
      }),
    );
  });

  test('the line breaks where there is no limit, and over a hole of the sweep', () => {
    const noLimit = traceSeries(
      trace([
        [30e6, 1, 2, 40],
        [31e6, 1, 2, null],
        [32e6, 1, 2, 40],
      ]),
      null,
      null,
      'margin',
    );
    expect(noLimit.filter(({ y }) => Number.isNaN(y))).toHaveLength(1);
    const level = traceSeries(
      trace([
        [30e6, 1, 2, 40],
        [31e6, 1, 2, null],
        [32e6, 1, 2, 40],
      ]),
      null,
      null,
      'level',
    );
    expect(level.some(({ y }) => Number.isNaN(y))).toBe(false);
    const hole = [{ fromHz: 30.5e6, toHz: 31.5e6 }];
    const broken = traceSeries(
      trace([
        [30e6, 1, 2, 40],
        [32e6, 1, 2, 40],
      ]),
      null,
      null,
      'level',
      hole,
    );
    expect(broken.filter(({ y }) => Number.isNaN(y))).toHaveLength(1);
  });

  test('a finer window stands in for the overview inside its own span', () => {
    const overview = trace([30, 40, 50, 60].map((mhz) => [mhz * 1e6, 0, 5, 40]));
    const detail = trace([
      [39e6, 1, 1, 40],
      [41e6, 2, 2, 40],
    ]);
    const drawn = traceSeries(overview, detail, { fromHz: 38e6, toHz: 45e6 }, 'level');
    expect([...new Set(drawn.map(({ x }) => x / 1e6))]).toEqual([30, 39, 41, 50, 60]);
  });

  test('extremes of what is drawn; null when nothing is', () => {
    const window = {
      fromHz: 30e6,
      toHz: 32e6,
      columns: 2,
      traces: [
        trace([
          [30e6, 10, 20, 40],
          [32e6, 5, 46.2, 40],
        ]),
      ],
    };
    expect(seriesExtremes(window, 'level')).toEqual({ high: 46.2, low: 5 });
    expect(seriesExtremes(window, 'margin')!.high).toBeCloseTo(6.2, 12);
    expect(seriesExtremes(null, 'margin')).toBeNull();
  });

  test('the nearest column on the log axis', () => {
    const spread = trace([30, 40, 160].map((mhz) => [mhz * 1e6, 0, 0, 40]));
    expect(nearestColumn(spread, 79e6)).toBe(1);
    expect(nearestColumn(spread, 81e6)).toBe(2);
    expect(nearestColumn(spread, 1e6)).toBe(0);
    expect(nearestColumn(trace([]), 1e6)).toBeNull();
  });
});
