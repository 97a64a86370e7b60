import uncertainties from '@fixtures/published/uncertainty.json';
import { againstUcispr, UCISPR_MEASUREMENTS, ucisprDbOf, ucisprExcessDb } from '@/emc/ucispr';

const { rows } = uncertainties.ucispr;

test('every published measurement is there, and no other', () => {
  expect([...UCISPR_MEASUREMENTS]).toEqual(rows.map(({ measurement }) => measurement));
});

test.each(rows)(
  '$measurement in the 2011 edition is $ucisprDb2011 dB (CISPR 16-4-2:2011 Table 1, from memory)',
  (row) => {
    const measurement = UCISPR_MEASUREMENTS.find((one) => one === row.measurement)!;
    expect(ucisprDbOf(measurement, 'CISPR 16-4-2:2011')).toBe(row.ucisprDb2011);
  },
);

test.each(rows)('$measurement in the 2003 edition is $ucisprDb2003 dB (CISPR 16-4-2:2003, from memory)', (row) => {
  const measurement = UCISPR_MEASUREMENTS.find((one) => one === row.measurement)!;
  expect(ucisprDbOf(measurement, 'CISPR 16-4-2:2003')).toBe(row.ucisprDb2003 ?? null);
});

describe('a laboratory beside Ucispr (CISPR 16-4-2:2011 clause 4.1)', () => {
  const radiated = 'radiated, OATS or SAC, 30-1000 MHz';

  test('the edition decides: 5.9 dB is at most Ucispr of 2011 and above that of 2003', () => {
    expect(againstUcispr(5.9, radiated, 'CISPR 16-4-2:2011')).toMatchObject({
      excessDb: 0,
      statement: 'at most Ucispr',
    });
    const of2003 = againstUcispr(5.9, radiated, 'CISPR 16-4-2:2003');
    expect(of2003).toMatchObject({ ucisprDb: 5.2, statement: 'above Ucispr', expandedDb: 5.9, measurement: radiated });
    expect(of2003.excessDb).toBeCloseTo(0.7, 12);
  });

  test('exactly Ucispr is at most Ucispr', () => {
    expect(againstUcispr(6.3, radiated, 'CISPR 16-4-2:2011')).toMatchObject({
      excessDb: 0,
      statement: 'at most Ucispr',
    });
  });

  test('without Ucispr in the edition there is no excess', () => {
    expect(againstUcispr(2, 'radiated, FAR, 1-6 GHz', 'CISPR 16-4-2:2003')).toMatchObject({
      ucisprDb: null,
      excessDb: null,
      statement: 'no Ucispr in this edition',
    });
  });

  test('an uncertainty that is no figure is refused by name', () => {
    for (const wrong of [-1, NaN, Infinity]) {
      expect(() => ucisprExcessDb(wrong, 3)).toThrow(String(wrong));
      expect(() => ucisprExcessDb(3, wrong)).toThrow(String(wrong));
      expect(() => againstUcispr(wrong, radiated, 'CISPR 16-4-2:2003')).toThrow(RangeError);
      expect(() => againstUcispr(wrong, 'radiated, FAR, 1-6 GHz', 'CISPR 16-4-2:2003')).toThrow(RangeError);
    }
  });
});
