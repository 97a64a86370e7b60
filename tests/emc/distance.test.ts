import conversions from '@fixtures/published/conversions.json';
import fc from 'fast-check';
import { DISTANCE_RULES, distanceTerm, fallOffDbPerDecade, type Conversion } from '@/emc/distance';
import { smallSourceBoundaryM } from '@/emc/nearField';
import { dbuvFromMicrovolts } from '@/emc/units';

const of = (more: Partial<Conversion>) =>
  distanceTerm({ frequencyHz: 100e6, fromM: 10, toM: 3, rule: 'inverse-distance', extentM: null, ...more });
const doubtsOf = (more: Partial<Conversion>) => {
  const { standing } = of(more);
  return standing.shows === 'at-most-over' ? standing.doubts.map((doubt) => doubt.because) : [];
};

describe('the distance correction as a term', () => {
  test.each(conversions.distance.rows)(
    '$fromM m to $toM m: 20 and 40 dB per decade (47 CFR 15.31(f), inverse-distance law, computed table)',
    ({ fromM, toM, n20DbPerDecade, n40DbPerDecade }) => {
      expect(of({ fromM, toM }).correctionDb).toBeCloseTo(n20DbPerDecade, 4);
      expect(of({ fromM, toM, frequencyHz: 1e6 }).correctionDb).toBeCloseTo(n20DbPerDecade, 4);
      const below30 = of({ fromM, toM, rule: '47 CFR 15.31(f)', frequencyHz: 1e6 });
      expect(below30.correctionDb).toBeCloseTo(n40DbPerDecade, 4);
      expect(below30.dbPerDecade).toBe(40);
    },
  );

  test('10 m to 3 m is 10.4576 dB, 20.9151 dB at 40 dB per decade (computed with CODATA values)', () => {
    const db = (name: string) => conversions.constants.rows.find((row) => row.name === name)!.db!;
    expect(of({}).correctionDb).toBeCloseTo(db('10 m to 3 m, 20 dB per decade'), 4);
    const below30 = of({ frequencyHz: 29e6, rule: '47 CFR 15.31(f)' });
    expect(below30.correctionDb).toBeCloseTo(db('10 m to 3 m, 40 dB per decade'), 4);
  });

  test('30 uV/m at 30 m, 13.56 MHz, is 69.5424 dBuV/m at 3 m (47 CFR 15.31(f)(2), computed)', () => {
    const term = of({ frequencyHz: 13.56e6, fromM: 30, toM: 3, rule: '47 CFR 15.31(f)' });
    expect(dbuvFromMicrovolts(30)! + term.correctionDb).toBeCloseTo(69.5424, 4);
  });

  test('40 dB per decade ends below 30 MHz: 30 MHz itself has 20 (47 CFR 15.31(f)(1): at or above 30 MHz)', () => {
    expect(fallOffDbPerDecade('47 CFR 15.31(f)', 29.999999e6)).toBe(40);
    expect(fallOffDbPerDecade('47 CFR 15.31(f)', 30e6)).toBe(20);
    expect(fallOffDbPerDecade('inverse-distance', 9e3)).toBe(20);
  });

  test('going there and back corrects by nothing, and going further out lowers the level (property)', () => {
    const metres = fc.double({ min: 0.1, max: 300, noNaN: true });
    const hertz = fc.double({ min: 9e3, max: 6e9, noNaN: true });
    fc.assert(
      fc.property(metres, metres, hertz, fc.constantFrom(...DISTANCE_RULES), (a, b, frequencyHz, rule) => {
        const out = of({ fromM: a, toM: b, frequencyHz, rule }).correctionDb;
        expect(out + of({ fromM: b, toM: a, frequencyHz, rule }).correctionDb).toBeCloseTo(0, 9);
        expect(Math.sign(out)).toBe(Math.sign(a - b));
      }),
    );
  });

  test('what is no distance, frequency or extent is refused by name', () => {
    for (const figure of [0, -3, NaN, Infinity]) {
      expect(() => of({ fromM: figure })).toThrow(new RangeError(`Distance ${figure} m is not above zero.`));
      expect(() => of({ toM: figure })).toThrow(new RangeError(`Distance ${figure} m is not above zero.`));
      expect(() => of({ frequencyHz: figure })).toThrow(new RangeError(`Frequency ${figure} Hz is not above zero.`));
      expect(() => of({ extentM: figure })).toThrow(new RangeError(`Extent ${figure} m is not above zero.`));
    }
  });
});

describe('what a converted level can show', () => {
  test('in the far field at both ends it shows under and over', () => {
    expect(of({ frequencyHz: 100e6, fromM: 10, toM: 3 }).standing).toEqual({ shows: 'under-and-over' });
  });

  test('from within lambda/2pi it never shows under: 3 m below 15.9045 MHz (computed table)', () => {
    const [at3m] = conversions.nearField.frequencyWhereBoundaryEqualsDistance;
    const hz = at3m!.freqMHz * 1e6;
    expect(doubtsOf({ fromM: 3, toM: 10, frequencyHz: hz - 100 })).toEqual(['starts-in-near-field']);
    expect(doubtsOf({ fromM: 3, toM: 10, frequencyHz: hz + 100 })).toEqual([]);
    expect(of({ fromM: 3, toM: 10, frequencyHz: 10e6 }).standing).toEqual({
      shows: 'at-most-over',
      doubts: [{ because: 'starts-in-near-field', border: 'lambda/2pi', boundaryM: smallSourceBoundaryM(10e6) }],
    });
  });

  test('nor into the near field', () => {
    expect(doubtsOf({ fromM: 10, toM: 3, frequencyHz: 10e6 })).toEqual(['ends-in-near-field']);
    expect(doubtsOf({ fromM: 10, toM: 3, frequencyHz: 1e6 })).toEqual(['starts-in-near-field', 'ends-in-near-field']);
  });

  test('nor from 1 m or closer, at any frequency', () => {
    expect(doubtsOf({ fromM: 1, toM: 3, frequencyHz: 3e9 })).toEqual(['starts-at-1-m']);
    expect(doubtsOf({ fromM: 0.5, toM: 3, frequencyHz: 3e9 })).toEqual(['starts-at-1-m']);
    expect(doubtsOf({ fromM: 1.01, toM: 3, frequencyHz: 3e9 })).toEqual([]);
  });

  test('nor from within 2 D^2/lambda of a source whose extent is known: 1 m at 1 GHz has 6.67 m', () => {
    expect(doubtsOf({ fromM: 3, toM: 10, frequencyHz: 1e9, extentM: 1 })).toEqual(['starts-in-near-field']);
    expect(doubtsOf({ fromM: 7, toM: 10, frequencyHz: 1e9, extentM: 1 })).toEqual([]);
    expect(doubtsOf({ fromM: 10, toM: 3, frequencyHz: 1e9, extentM: 1 })).toEqual(['ends-in-near-field']);
    expect(of({ fromM: 3, toM: 10, frequencyHz: 1e9, extentM: 1 }).standing).toMatchObject({
      doubts: [{ border: '2D2/lambda', boundaryM: 2 / 0.299792458 }],
    });
  });

  test('a level at the limit distance is not converted and is in no doubt', () => {
    for (const distanceM of [0.5, 1, 3]) {
      const term = of({ fromM: distanceM, toM: distanceM, frequencyHz: 1e6 });
      expect(term.correctionDb).toBe(0);
      expect(term.standing).toEqual({ shows: 'under-and-over' });
    }
  });
});
