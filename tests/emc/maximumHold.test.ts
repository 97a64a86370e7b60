import fc from 'fast-check';
import { maximumHold, type HeldTrace } from '@/emc/maximumHold';

function held(points: [hz: number, levelDb: number | null][], more: Partial<HeldTrace> = {}): HeldTrace {
  return {
    name: 'run',
    state: 'S1',
    mode: 'charging',
    distanceM: 3,
    bandwidthHz: 120e3,
    detector: 'peak',
    unit: 'dBuV/m',
    polarisation: 'horizontal',
    heightM: 1,
    azimuthDeg: 0,
    frequencyHz: Float64Array.from(points, ([hz]) => hz),
    levelDb: Float64Array.from(points, ([, level]) => level ?? 0),
    has: Uint8Array.from(points, ([, level]) => (level === null ? 0 : 1)),
    ...more,
  };
}

function entries(traces: HeldTrace[]) {
  const { hold } = maximumHold(traces);
  return Array.from(hold!.frequencyHz, (hz, i) => [
    hz,
    hold!.levelDb[i],
    hold!.trace[i],
    hold!.point[i],
    hold!.compared[i],
  ]);
}

const anyTraces = fc.array(
  fc
    .record({
      from: fc.integer({ min: 1, max: 60 }),
      step: fc.integer({ min: 1, max: 9 }),
      levels: fc.array(fc.option(fc.integer({ min: 0, max: 60 })), { minLength: 1, maxLength: 30 }),
    })
    .map(({ from, step, levels }) => held(levels.map((level, i) => [from + i * step, level]))),
  { minLength: 1, maxLength: 4 },
);

describe('maximum hold over positions (common practice)', () => {
  test('on one axis it is the highest level of each point, with the run it came from', () => {
    const a = held([
      [100, 30],
      [110, 20],
      [120, 25],
    ]);
    const b = held(
      [
        [100, 28],
        [110, 24],
        [120, 25],
      ],
      { polarisation: 'vertical' },
    );
    expect(entries([a, b])).toEqual([
      [100, 30, 0, 0, 2],
      [110, 24, 1, 1, 2],
      [120, 25, 0, 2, 2],
    ]);
  });

  test('points less than half the finer step apart are compared; at half a step each stands for itself', () => {
    const a = held([
      [100, 30],
      [110, 20],
      [120, 25],
    ]);
    expect(
      entries([
        a,
        held([
          [104.9, 40],
          [114.9, 10],
        ]),
      ]),
    ).toEqual([
      [104.9, 40, 1, 0, 2],
      [110, 20, 0, 1, 2],
      [120, 25, 0, 2, 1],
    ]);
    expect(
      entries([
        a,
        held([
          [105, 40],
          [115, 10],
        ]),
      ]).map(([hz]) => hz),
    ).toEqual([100, 105, 110, 115, 120]);
    // A step of 4 is the finer one: 2 is too far, 1.9 is not.
    expect(
      entries([
        a,
        held([
          [102, 40],
          [106, 10],
        ]),
      ]),
    ).toHaveLength(5);
    expect(
      entries([
        a,
        held([
          [101.9, 40],
          [105.9, 10],
        ]),
      ]),
    ).toHaveLength(4);
    expect(
      entries([
        held([
          [101.9, 40],
          [105.9, 10],
        ]),
        a,
      ]),
    ).toHaveLength(4);
  });

  test('a lone point is compared only at its very frequency', () => {
    const a = held([
      [100, 30],
      [110, 20],
    ]);
    expect(entries([a, held([[110, 50]])])).toEqual([
      [100, 30, 0, 0, 1],
      [110, 50, 1, 0, 2],
    ]);
    expect(entries([a, held([[110.001, 50]])])).toHaveLength(3);
  });

  test('an edge that stands twice is compared with itself and with the others', () => {
    const joined = held([
      [100, 30],
      [110, 20],
      [110, 22],
      [111, 5],
    ]);
    expect(
      entries([
        joined,
        held([
          [110, 21],
          [120, 1],
        ]),
      ]),
    ).toEqual([
      [100, 30, 0, 0, 1],
      [110, 22, 0, 2, 3],
      [111, 5, 0, 3, 1],
      [120, 1, 1, 1, 1],
    ]);
  });

  test('an edge that stands twice has the step to its next neighbour', () => {
    const joined = held([
      [100, 30],
      [110, 20],
      [110, 22],
      [120, 5],
    ]);
    const shifted = held([
      [112, 40],
      [122, 1],
    ]);
    expect(entries([joined, shifted])).toEqual([
      [100, 30, 0, 0, 1],
      [112, 40, 1, 0, 3],
      [120, 5, 0, 3, 2],
    ]);
  });

  test('what is at one frequency stays together, whichever trace comes first', () => {
    const coarse = held([
      [100, 30],
      [110, 20],
    ]);
    const shifted = held([
      [102, 20],
      [112, 10],
    ]);
    const fine = held([
      [102, 25],
      [105, 1],
    ]);
    const levels = (traces: HeldTrace[]) => entries(traces).map(([hz, level, , , compared]) => [hz, level, compared]);
    const expected = [
      [100, 30, 1],
      [102, 25, 2],
      [105, 1, 1],
      [110, 20, 2],
    ];
    expect(levels([coarse, shifted, fine])).toEqual(expected);
    expect(levels([fine, coarse, shifted])).toEqual(expected);
  });

  test('a point without a level is not there', () => {
    expect(
      entries([
        held([
          [100, null],
          [110, 20],
        ]),
        held([
          [100, 3],
          [110, null],
        ]),
      ]),
    ).toEqual([
      [100, 3, 1, 0, 1],
      [110, 20, 0, 1, 1],
    ]);
  });

  test.each([
    ['state', { state: 'S2' }],
    ['operating mode', { mode: 'standby' }],
    ['distance in m', { distanceM: 10 }],
    ['distance in m', { distanceM: null }],
    ['bandwidth in Hz', { bandwidthHz: 9e3 }],
    ['detector', { detector: 'quasi-peak' }],
    ['unit', { unit: 'dBuA/m' }],
  ] as [string, Partial<HeldTrace>][])('a %s that differs is refused with a reason', (what, more) => {
    const { hold, because } = maximumHold([held([[1, 1]]), held([[1, 2]], { name: 'other', ...more })]);
    expect(hold).toBeNull();
    expect(because).toContain(`The ${what} differs: `);
    expect(because).toContain('in other');
  });

  test('polarisation, height and azimuth may differ', () => {
    const other = held([[1, 2]], { polarisation: 'vertical', heightM: 4, azimuthDeg: 270 });
    expect(maximumHold([held([[1, 1]]), other]).because).toBeNull();
  });

  test('what cannot be a trace is refused by name', () => {
    expect(() => maximumHold([])).toThrow('at least one trace');
    expect(() =>
      maximumHold([
        held([
          [2, 1],
          [1, 1],
        ]),
      ]),
    ).toThrow('run: 1 Hz follows 2 Hz');
    expect(() => maximumHold([held([[0, 1]])])).toThrow('0 Hz is no frequency');
    expect(() => maximumHold([held([[1, NaN]])])).toThrow('NaN at 1 Hz');
    expect(() => maximumHold([held([[1, 1]], { levelDb: new Float64Array(2) })])).toThrow('1 frequencies and 2 levels');
    expect(() => maximumHold([held([[1, 1]], { has: new Uint8Array(2) })])).toThrow(RangeError);
  });

  test('every entry was read where it says, every level that was read has one at least as high near it, each point counts once (property)', () => {
    fc.assert(
      fc.property(anyTraces, (traces) => {
        const all = entries(traces) as [number, number, number, number, number][];
        for (const [hz, level, trace, point] of all) {
          expect([traces[trace]!.frequencyHz[point], traces[trace]!.levelDb[point]]).toEqual([hz, level]);
        }
        expect(all.map(([hz]) => hz)).toEqual(all.map(([hz]) => hz).sort((a, b) => a - b));
        const levels = traces.reduce((sum, { has }) => sum + has.filter(Boolean).length, 0);
        expect(all.reduce((sum, [, , , , compared]) => sum + compared, 0)).toBe(levels);
        for (const trace of traces) {
          trace.has.forEach((has, i) => {
            if (!has) return;
            const near = all.filter(
              ([hz]) => Math.abs(hz - trace.frequencyHz[i]!) < 4.5 || hz === trace.frequencyHz[i],
            );
            expect(Math.max(...near.map(([, level]) => level))).toBeGreaterThanOrEqual(trace.levelDb[i]!);
          });
        }
      }),
    );
  });

  test('the order of the traces changes no frequency and no level (property)', () => {
    fc.assert(
      fc.property(anyTraces, (traces) => {
        const levels = (list: HeldTrace[]) => entries(list).map(([, level]) => level);
        expect(levels([...traces].reverse())).toEqual(levels(traces));
      }),
    );
  });
});
