import fc from 'fast-check';
import { compareWithAmbient, type AmbientCandidate, type AmbientRun } from '@/emc/ambient';
import { VERDICTS, type Verdict } from '@/emc/kinds';

const ambientOf = (points: [hz: number, levelDb: number][]): AmbientRun => ({
  frequencyHz: Float64Array.from(points, ([hz]) => hz),
  levelDb: Float64Array.from(points, ([, level]) => level),
});
const candidate = (more: Partial<AmbientCandidate> = {}): AmbientCandidate => ({
  frequencyHz: 100e6,
  bandwidthHz: 120e3,
  levelDb: 40,
  verdict: 'over',
  exclusion: null,
  ...more,
});
const quiet = ambientOf([
  [99e6, 10],
  [100e6, 12],
  [101e6, 10],
]);
const find = (one: AmbientCandidate, ambient = quiet, withinDb = 6) => compareWithAmbient([one], ambient, withinDb)[0]!;

describe('an EUT-off run laid under an EUT run', () => {
  test('a candidate well above the ambient stands as judged, with the difference', () => {
    expect(find(candidate())).toEqual({
      presentInAmbient: false,
      differenceDb: 28,
      obscured: false,
      verdict: 'over',
      counts: true,
      because: null,
    });
  });

  test('at exactly the stated difference it is present in the ambient, a little above it is not', () => {
    expect(find(candidate({ levelDb: 18 }))).toMatchObject({ presentInAmbient: true, differenceDb: 6, obscured: true });
    expect(find(candidate({ levelDb: 18.001 }))).toMatchObject({ presentInAmbient: false, obscured: false });
    expect(find(candidate({ levelDb: 5 }))).toMatchObject({ presentInAmbient: true, differenceDb: -7, obscured: true });
    expect(find(candidate({ levelDb: 12 }), quiet, 0)).toMatchObject({ obscured: true });
  });

  test.each([
    ['over', 'needs-final', true],
    ['needs-final', 'needs-final', true],
    ['inconclusive', 'needs-final', true],
    ['not-covered', 'not-covered', true],
    ['under', 'under', false],
  ] as [Verdict, Verdict, boolean][])(
    'within the difference %s reads %s: signal plus ambient under still counts as under (CISPR 16-2-3, from memory)',
    (judged, verdict, obscured) => {
      expect(find(candidate({ levelDb: 14, verdict: judged }))).toMatchObject({
        presentInAmbient: true,
        verdict,
        obscured,
        because: obscured ? expect.stringContaining('does not tell it from the EUT') : null,
      });
    },
  );

  test('the highest ambient level within half the bandwidth to either side is compared, its edges included', () => {
    const ambient = ambientOf([
      [99e6, 0],
      [100e6 - 60_001, 39],
      [100e6 - 60_000, 30],
      [100e6, 20],
      [100e6 + 60_000, 33],
      [100e6 + 60_001, 38],
      [101e6, 0],
    ]);
    expect(find(candidate(), ambient).differenceDb).toBe(7);
    expect(find(candidate({ bandwidthHz: 9e3 }), ambient).differenceDb).toBe(20);
    expect(find(candidate({ bandwidthHz: 120_002 }), ambient).differenceDb).toBe(1);
  });

  test('outside the ambient’s range, and between points wider apart than the bandwidth, it is not known', () => {
    for (const frequencyHz of [99e6 - 1, 101e6 + 1]) {
      expect(find(candidate({ frequencyHz }))).toEqual({
        presentInAmbient: null,
        differenceDb: null,
        obscured: false,
        verdict: 'over',
        counts: true,
        because: 'The ambient run does not reach this frequency.',
      });
    }
    for (const frequencyHz of [99e6, 101e6]) expect(find(candidate({ frequencyHz })).differenceDb).toBe(30);
    expect(find(candidate({ frequencyHz: 99.5e6 })).because).toContain('no point within the bandwidth');
    expect(find(candidate(), ambientOf([])).presentInAmbient).toBeNull();
  });

  test('a person’s exclusion is taken with its reason and decides nothing else', () => {
    const excluded = find(candidate({ exclusion: 'FM broadcast, there with the EUT off' }));
    expect(excluded).toEqual({ ...find(candidate()), counts: false });
    expect(() => find(candidate({ exclusion: '  ' }))).toThrow('100000000 Hz is left out without a reason');
  });

  test('nothing becomes under that was not, and nothing becomes better than it was judged but for doubt (property)', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...VERDICTS),
        fc.double({ min: -20, max: 60, noNaN: true }),
        fc.double({ min: 0, max: 20, noNaN: true }),
        (verdict, levelDb, withinDb) => {
          const found = find(candidate({ verdict, levelDb }), quiet, withinDb);
          expect(found.verdict === 'under').toBe(verdict === 'under');
          expect([verdict, 'needs-final']).toContain(found.verdict);
          expect(found.obscured).toBe(found.presentInAmbient === true && verdict !== 'under');
        },
      ),
    );
  });

  test('what cannot be is refused by name', () => {
    expect(() => find(candidate(), quiet, -1)).toThrow('difference of -1 dB');
    expect(() => find(candidate(), quiet, NaN)).toThrow(RangeError);
    expect(() => find(candidate({ levelDb: NaN }))).toThrow('candidate of NaN dB');
    expect(() => find(candidate({ bandwidthHz: 0 }))).toThrow('in 0 Hz');
    expect(() => find(candidate({ frequencyHz: 0 }))).toThrow('at 0 Hz');
    expect(() =>
      find(
        candidate(),
        ambientOf([
          [2, 1],
          [1, 1],
        ]),
      ),
    ).toThrow('1 Hz follows 2 Hz');
    expect(() => find(candidate(), ambientOf([[1, Infinity]]))).toThrow('Infinity at 1 Hz');
    expect(() => find(candidate(), ambientOf([[-1, 0]]))).toThrow('-1 Hz is no frequency');
    expect(() => find(candidate(), { ...quiet, levelDb: new Float64Array(2) })).toThrow('3 frequencies and 2 levels');
  });
});
