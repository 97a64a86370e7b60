import conversions from '@fixtures/published/conversions.json';
import { correctionAt, levelUnitOf } from '@/emc/correction';
import type { LevelUnit } from '@/emc/kinds';
import { hangTrace, judgeSegment } from '@/emc/segment';
import type { PathTerm } from '@/emc/types';
import { microvoltsFromDbuv } from '@/emc/units';
import { tableOf, termOf, traceOf } from './given';

const flat = (quantity: 'antenna-factor' | 'loss' | 'gain', db: number) =>
  termOf(
    tableOf(
      quantity,
      [
        [1, db],
        [6000, db],
      ],
      `${quantity} ${db}`,
    ),
  );

function levelOf(reading: number, unit: LevelUnit, terms: PathTerm[], megahertz = 100): number | null {
  const trace = traceOf([reading], { frequencyHz: [megahertz * 1e6], unit });
  const judged = judgeSegment(hangTrace(trace, terms, []), trace.frequencyHz, trace.reading);
  return judged.state[0] === 0 ? judged.level[0]! : null;
}

describe('E = reading + antenna factor + cable loss - preamplifier gain', () => {
  test.each(conversions.readingToField.rows)('$id: $fieldDbUvPerM dBuV/m ($source)', (row) => {
    const terms: PathTerm[] = [];
    if (row.antennaFactorDbPerM !== undefined) terms.push(flat('antenna-factor', row.antennaFactorDbPerM));
    if (row.siteCorrectionDbPerM !== undefined) terms.push(flat('antenna-factor', row.siteCorrectionDbPerM));
    if (row.cableLossDb !== undefined) terms.push(flat('loss', row.cableLossDb));
    if (row.cablePlusPreampDb !== undefined) terms.push(flat('loss', row.cablePlusPreampDb));
    if (row.preampGainDb !== undefined) terms.push(flat('gain', row.preampGainDb));
    if (row.averageFactorDb !== undefined) terms.push(flat('gain', -row.averageFactorDb));
    const reading = row.readingDbm ?? row.readingDbUv;
    const level = levelOf(reading, row.readingDbm === undefined ? 'dBuV' : 'dBm', terms, row.freqMHz)!;
    // Readings are rounded once to Float32: 24 bits, 4e-6 dB at 62 dBuV.
    expect(level).toBeCloseTo(row.fieldDbUvPerM, 4);
    expect(microvoltsFromDbuv(level) / row.fieldUvPerM).toBeCloseTo(1, 2);
    if (row.marginDb !== undefined) expect(row.limitDbUvPerM! - level).toBeCloseTo(row.marginDb, 4);
  });
});

describe('terms of the signal path', () => {
  const antenna = termOf(
    tableOf(
      'antenna-factor',
      [
        [30, 18.2],
        [1000, 27.6],
      ],
      'antenna',
    ),
  );
  const cable = termOf(
    tableOf(
      'loss',
      [
        [30, 0.4],
        [1000, 2.8],
      ],
      'cable',
    ),
  );
  const gain = termOf(
    tableOf(
      'gain',
      [
        [30, 31.2],
        [500, 29.6],
      ],
      'preamplifier',
    ),
  );

  test('losses add, gains subtract, and only what is applied counts', () => {
    expect(correctionAt([antenna, cable, gain], 30e6)).toBeCloseTo(18.2 + 0.4 - 31.2, 12);
    expect(correctionAt([antenna, { ...cable, applied: false }], 30e6)).toBe(18.2);
    expect(correctionAt([], 30e6)).toBe(0);
    expect(levelOf(40, 'dBuV', [antenna, { ...cable, applied: false }], 30)).toBeCloseTo(58.2, 12);
  });

  test('where one applied table has no value there is no level; a table that is not applied does not matter', () => {
    expect(correctionAt([antenna, cable, gain], 600e6)).toBeNull();
    expect(levelOf(40, 'dBuV', [antenna, cable, gain], 600)).toBeNull();
    expect(levelOf(40, 'dBuV', [antenna, cable, { ...gain, applied: false }], 600)).not.toBeNull();
  });

  test('an antenna factor turns dBuV into dBuV/m; without one the level stays dBuV', () => {
    expect(levelUnitOf('dBuV', [antenna, cable])).toBe('dBuV/m');
    expect(levelUnitOf('dBm', [antenna])).toBe('dBuV/m');
    expect(levelUnitOf('dBm', [cable])).toBe('dBuV');
    expect(levelUnitOf('dBuV', [{ ...antenna, applied: false }])).toBe('dBuV');
    expect(levelUnitOf('V', [])).toBe('dBuV');
  });

  test.each(['dBuV/m', 'dBuA', 'dBuA/m', 'dBpW'] as const)(
    'a reading in %s takes no factor: nothing is added twice',
    (unit) => {
      expect(levelUnitOf(unit, [])).toBe(unit);
      expect(levelUnitOf(unit, [{ ...antenna, applied: false }])).toBe(unit);
      expect(() => levelUnitOf(unit, [antenna])).toThrow(/counted twice/);
      expect(() => levelUnitOf(unit, [cable])).toThrow(/counted twice/);
      expect(levelOf(37.5, unit, [])).toBe(37.5);
    },
  );

  test('two antenna factors in one path are refused', () => {
    expect(() => levelUnitOf('dBuV', [antenna, antenna])).toThrow(/Two antenna factors/);
  });

  test('a relative reading is never a level, whatever the path', () => {
    expect(levelUnitOf('dB', [antenna])).toBeNull();
    expect(levelOf(40, 'dB', [antenna])).toBeNull();
  });

  test('a linear zero, and a reading that is no figure, are no level', () => {
    expect(levelOf(0, 'uV', [])).toBeNull();
    expect(levelOf(NaN, 'dBuV', [])).toBeNull();
    expect(levelOf(-Infinity, 'dBm', [])).toBeNull();
    expect(levelOf(100, 'uV', [])).toBeCloseTo(40, 12);
  });
});
