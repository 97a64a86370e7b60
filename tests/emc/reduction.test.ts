import uncertainties from '@fixtures/published/uncertainty.json';
import fc from 'fast-check';
import { reductionNeeded } from '@/emc/reduction';
import { decide } from '@/emc/verdict';

const decisive = { under: true, over: true, otherwise: 'inconclusive' } as const;

describe('the reduction an emission needs', () => {
  test('6.2 over with U = 6.3 needs more than 12.5 dB, to less than 0.237 of the field', () => {
    const needed = reductionNeeded(-6.2, { uncertaintyDb: 6.3 });
    expect(needed.reductionDb).toBeCloseTo(12.5, 12);
    expect(needed).toMatchObject({ moreThan: true, because: null });
    expect(needed.factor).toBeCloseTo(0.2371, 4);
  });

  test.each(uncertainties.guardedDecision.rows)(
    'limit $limit, reading $reading, U $expandedUDb: none is needed just where the decision is under (ILAC-G8:09/2019 section 4.2, verified; a margin of exactly U needs more here)',
    ({ limit, reading, expandedUDb, guardedAcceptance }) => {
      const marginDb = limit - reading;
      const needed = reductionNeeded(marginDb, { uncertaintyDb: expandedUDb });
      if (Math.abs(marginDb - expandedUDb) > 1e-9) expect(!needed.moreThan).toBe(guardedAcceptance === 'pass');
      expect(!needed.moreThan).toBe(decide(decisive, marginDb, { db: expandedUDb, between: true }) === 'under');
    },
  );

  test('a margin of exactly U needs more than 0 dB; one of exactly the target needs nothing', () => {
    expect(reductionNeeded(5, { uncertaintyDb: 5 })).toMatchObject({ reductionDb: 0, moreThan: true, factor: 1 });
    expect(reductionNeeded(5, { targetMarginDb: 5 })).toMatchObject({ reductionDb: 0, moreThan: false, factor: 1 });
    expect(reductionNeeded(9, { targetMarginDb: 5 })).toMatchObject({ reductionDb: 0, moreThan: false });
    expect(reductionNeeded(2, { targetMarginDb: 5 })).toMatchObject({ reductionDb: 3, moreThan: false });
    expect(reductionNeeded(-4, { targetMarginDb: -1 })).toMatchObject({ reductionDb: 3, moreThan: false });
  });

  test('a little more than the figure makes it under, a little less does not (property)', () => {
    const db = fc.double({ min: -40, max: 40, noNaN: true });
    fc.assert(
      fc.property(db, fc.double({ min: 0, max: 10, noNaN: true }), (marginDb, uncertaintyDb) => {
        const { reductionDb, moreThan, factor } = reductionNeeded(marginDb, { uncertaintyDb });
        expect(decide(decisive, marginDb + reductionDb! + 1e-9, { db: uncertaintyDb, between: true })).toBe('under');
        if (moreThan)
          expect(decide(decisive, marginDb + reductionDb! - 1e-9, { db: uncertaintyDb, between: true })).not.toBe(
            'under',
          );
        expect(20 * Math.log10(factor!)).toBeCloseTo(-reductionDb!, 9);
      }),
    );
  });

  test('without a margin or an uncertainty there is none, with a reason; what is no figure is refused', () => {
    const none = { reductionDb: null, moreThan: false, factor: null };
    expect(reductionNeeded(null, { uncertaintyDb: 5 })).toEqual({
      ...none,
      because: expect.stringContaining('no margin'),
    });
    expect(reductionNeeded(3, { uncertaintyDb: null })).toEqual({
      ...none,
      because: expect.stringContaining('uncertainty'),
    });
    expect(() => reductionNeeded(NaN, { uncertaintyDb: 5 })).toThrow('Margin NaN dB');
    expect(() => reductionNeeded(1, { uncertaintyDb: -0.1 })).toThrow('uncertainty -0.1 dB');
    expect(() => reductionNeeded(1, { targetMarginDb: Infinity })).toThrow('goal of Infinity dB');
  });
});
