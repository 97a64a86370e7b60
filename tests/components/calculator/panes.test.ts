import conversions from '@fixtures/published/conversions.json';
import radiation from '@fixtures/published/radiation.json';
import receiver from '@fixtures/published/receiver.json';
import uncertainties from '@fixtures/published/uncertainty.json';
import { readPane, type Entries } from '@/components/calculator/givenOf';
import type { Answer, Term } from '@/components/calculator/pane';
import { findPanes, PANES, paneOf } from '@/components/calculator/panes';

/** What a pane answers to what was typed into it. */
function asked(id: string, entries: Record<string, string | number>) {
  const pane = PANES.find((one) => one.id === id)!;
  const typed = Object.fromEntries(Object.entries(entries).map(([name, value]) => [name, String(value)]));
  const read = readPane(pane, typed);
  const outcome = pane.compute(read.given);
  const of = (answer: string) => outcome.answers.find((one) => one.id === answer)!;
  return {
    ...read,
    ...outcome,
    of,
    figure: (answer: string) => of(answer).working!.result.value,
    why: (answer: string) => of(answer).because,
    sentence: outcome.says?.map(({ text }) => text).join('') ?? null,
  };
}

describe('level units', () => {
  test.each(conversions.powerToVoltage.rows)(
    '$powerDbm dBm in 50 ohm is $voltageDbUv50ohm dBµV and $voltageUv µV (definitions, computed with GNU Units)',
    (row) => {
      const { figure } = asked('levels', { unit: 'dBm', level: row.powerDbm, ohm: 50 });
      expect(figure('dbuv')).toBeCloseTo(row.voltageDbUv50ohm, 4);
      expect((figure('volts') * 1e6) / row.voltageUv).toBeCloseTo(1, 6);
      expect(asked('levels', { unit: 'uV', level: row.voltageUv, ohm: 50 }).figure('dbm')).toBeCloseTo(row.powerDbm, 4);
    },
  );
  test('75 ohm adds 108.7506 dB (computed with GNU Units)', () => {
    const add = conversions.constants.rows.find(({ name }) => name === 'dBm to dBuV in 75 ohm')!.addDb!;
    expect(asked('levels', { unit: 'dBm', level: 0, ohm: 75 }).figure('dbuv')).toBeCloseTo(add, 4);
  });
  test('5 ohm of transfer impedance takes off 14 dB (antenna maker’s conversion note, verified)', () => {
    expect(asked('levels', { unit: 'dBuV', level: 40, ohm: 5 }).figure('dbua')).toBeCloseTo(40 - 13.9794, 4);
  });
  test('volts to dBµV needs no impedance, dBm does and waits for it', () => {
    const { figure, why } = asked('levels', { unit: 'uV', level: 39.8 });
    expect(figure('dbuv')).toBeCloseTo(31.9977, 4);
    expect(why('dbm')).toBe('waits for impedance');
  });
  test('a level in volts of zero is refused beside its field, and nothing is answered', () => {
    const { problems, answers } = asked('levels', { unit: 'V', level: 0, ohm: 50 });
    expect(problems).toEqual({ level: '0 is not above zero.' });
    expect(answers.every(({ working }) => working === null)).toBe(true);
  });
});

describe('field strength from a reading', () => {
  const rows = conversions.readingToField.rows.filter(
    (row) => row.antennaFactorDbPerM !== undefined && row.cableLossDb !== undefined,
  );
  test.each(rows)('$id: $readingDbUv dBµV is $fieldDbUvPerM dBµV/m ($source)', (row) => {
    const averageFactorDb = 'averageFactorDb' in row ? (row.averageFactorDb ?? 0) : 0;
    const { figure } = asked('field', {
      unit: 'dBuV',
      reading: row.readingDbUv + averageFactorDb,
      af: row.antennaFactorDbPerM!,
      loss: row.cableLossDb!,
      gain: row.preampGainDb ?? 0,
    });
    expect(figure('level')).toBeCloseTo(row.fieldDbUvPerM, 3);
  });
  test('a reading in dBm is converted in 50 ohm first (constructed-45.5, computed)', () => {
    const row = conversions.readingToField.rows.find(({ id }) => id === 'constructed-45.5')!;
    const { figure } = asked('field', {
      unit: 'dBm',
      reading: row.readingDbm!,
      af: row.antennaFactorDbPerM!,
      loss: row.cableLossDb!,
      limit: row.limitDbUvPerM!,
    });
    expect(figure('level')).toBeCloseTo(row.fieldDbUvPerM, 4);
    expect(figure('margin')).toBeCloseTo(row.marginDb!, 4);
  });
  test('what nobody gave is named in the working and not added', () => {
    const { of } = asked('field', { unit: 'dBuV', reading: 52.1, af: 14.3 });
    const absent = of('level').working!.terms.filter(({ quantity }) => quantity === null);
    expect(absent.map(({ name }) => name)).toEqual(['cable loss', 'preamplifier gain', 'distance correction']);
  });
  test('a term that is refused keeps the sum waiting: it is not taken as absent', () => {
    expect(asked('field', { unit: 'dBuV', reading: 52.1, af: 14.3, loss: '1,2,3' }).why('level')).toBe(
      'waits for cable loss',
    );
  });
  test('a conversion is chosen, stands as its own term and says what it may conclude', () => {
    const typed = { unit: 'dBuV', reading: 50, af: 10, f: 100, from: 10, to: 3 };
    expect(asked('field', typed).figure('level')).toBe(60);
    const far = asked('field', { ...typed, rule: '20' });
    expect(far.figure('level')).toBeCloseTo(70.4576, 4);
    expect(far.notes!.join(' ')).toContain('may show under and over');
    expect(far.cautions).toEqual([]);
    const near = asked('field', { ...typed, f: 1, from: 30, to: 3, rule: '47cfr' });
    expect(near.figure('level')).toBeCloseTo(100, 9);
    expect(near.cautions.join(' ')).toMatch(/30 m lies in the near field.*never shows under/);
  });
});

describe('distance', () => {
  test.each(conversions.distance.rows)(
    '$fromM m to $toM m (47 CFR 15.31(f), inverse-distance law, computed)',
    ({ fromM, toM, n20DbPerDecade, n40DbPerDecade }) => {
      const from = { from: fromM, to: toM, level: 0 };
      expect(asked('distance', { ...from, rule: '20', f: 1 }).figure('correction')).toBeCloseTo(n20DbPerDecade, 4);
      expect(asked('distance', { ...from, rule: '47cfr', f: 1 }).figure('level')).toBeCloseTo(n40DbPerDecade, 4);
      expect(asked('distance', { ...from, rule: '47cfr', f: 30 }).figure('correction')).toBeCloseTo(n20DbPerDecade, 4);
    },
  );
  test.each(conversions.nearField.rows)('λ/2π at $freqMHz MHz is $lambdaOver2piM m (computed)', (row) => {
    expect(asked('distance', { f: row.freqMHz }).figure('small')).toBeCloseTo(row.lambdaOver2piM, 5);
  });
  test.each(conversions.nearField.frequencyWhereBoundaryEqualsDistance)(
    '$distanceM m from $freqMHz MHz (computed)',
    (row) => {
      expect(asked('distance', { from: row.distanceM }).figure('lowest') / 1e6).toBeCloseTo(row.freqMHz, 4);
    },
  );
  test('from 1 m nothing concludes under', () => {
    expect(asked('distance', { rule: '20', f: '3 GHz', from: 1, to: 3 }).cautions.join(' ')).toMatch(
      /1 m is too close.*never shows under/,
    );
  });
});

test.each(conversions.antennaFactorFromGain.rows)(
  '$gainDbi dBi at $freqMHz MHz is $antennaFactorDbPerM dB/m in 50 ohm (effective aperture, computed)',
  (row) => {
    const at = { f: row.freqMHz, load: 50 };
    expect(asked('antenna', { have: 'gain', gain: row.gainDbi, ...at }).figure('af')).toBeCloseTo(
      row.antennaFactorDbPerM,
      4,
    );
    expect(asked('antenna', { have: 'af', af: row.antennaFactorDbPerM, ...at }).figure('gain')).toBeCloseTo(
      row.gainDbi,
      4,
    );
  },
);

describe('EIRP, ERP and field', () => {
  test.each(conversions.eirpToField.rows)(
    '$eirpDbm dBm EIRP is $fieldDbUvPerM dBµV/m at $distanceM m (E = √(30 P)/d, computed)',
    (row) => {
      expect(asked('eirp', { have: 'eirp', level: row.eirpDbm, d: row.distanceM }).figure('field')).toBeCloseTo(
        row.fieldDbUvPerM,
        4,
      );
      expect(asked('eirp', { have: 'field', level: row.fieldDbUvPerM, d: row.distanceM }).figure('eirp')).toBeCloseTo(
        row.eirpDbm,
        4,
      );
    },
  );
  test('43.5 dBµV/m at 3 m is −51.7 dBm EIRP, 2.15 dB less as ERP (conversion page, verified)', () => {
    const { figure, sentence } = asked('eirp', { have: 'field', level: '43,5', d: 3 });
    expect(figure('eirp')).toBeCloseTo(-51.7, 1);
    expect(figure('eirp') - figure('erp')).toBeCloseTo(2.15, 9);
    expect(sentence).toBe('43.50 dBµV/m at 3 m is −51.73 dBm EIRP.');
  });
  test('power typed waits for no distance to become the other power', () => {
    const { figure, why } = asked('eirp', { have: 'erp', level: 0 });
    expect(figure('eirp')).toBeCloseTo(2.15, 9);
    expect(why('field')).toBe('waits for distance');
  });
});

test.each(conversions.electricToMagnetic.rows)(
  '$fieldDbUvPerM dBµV/m is $fieldDbUaPerM dBµA/m of a plane wave (Z0 = 376.73 ohm, computed)',
  (row) => {
    expect(asked('plane', { unit: 'e', level: row.fieldDbUvPerM }).figure('h')).toBeCloseTo(row.fieldDbUaPerM, 4);
    expect(asked('plane', { unit: 'h', level: row.fieldDbUaPerM }).figure('e')).toBeCloseTo(row.fieldDbUvPerM, 4);
  },
);
test('0 dBm/m² is 115.8 dBµV/m and dBpT is dBµA/m + 2 (antenna maker’s conversion note, verified)', () => {
  const { figure } = asked('plane', { unit: 's', level: 0 });
  expect(figure('e')).toBeCloseTo(115.8, 1);
  expect(figure('b') - figure('h')).toBeCloseTo(1.984, 3);
});

describe('common-mode current', () => {
  const dbuv = (microvolts: number) => 20 * Math.log10(microvolts);
  const at = (row: { limitUvPerM: number; distanceM: number; freqMHz: number; lengthM: number }) => ({
    limit: dbuv(row.limitUvPerM),
    d: row.distanceM,
    f: row.freqMHz,
    length: row.lengthM,
    form: 'ground-plane-doubled',
  });
  test.each(radiation.commonMode.maxCurrentRows.rows)(
    '$limit: at most $maxCurrentUa µA at $freqMHz MHz on $lengthM m (computed, doubled form)',
    (row) => {
      const { of, figure, why } = asked('cable', at(row));
      if (row.freqMHz === 88) {
        expect(of('short').working).toBeNull();
        expect(why('short')).toContain('more than a quarter of a wavelength at 88.000 MHz');
      } else {
        expect(figure('short') * 1e6).toBeCloseTo(row.maxCurrentUa, 3);
        expect(figure('short-db')).toBeCloseTo(dbuv(row.maxCurrentUa), 3);
      }
    },
  );
  test('the form is chosen, never taken: until then both figures wait for the ground', () => {
    const { form: _, ...rest } = at(radiation.commonMode.maxCurrentRows.rows[1]!);
    expect(asked('cable', rest).why('short')).toBe('waits for ground');
    expect(asked('cable', rest).why('half')).toBe('waits for ground');
  });
  test('free space allows 6.02 dB more', () => {
    const row = at(radiation.commonMode.maxCurrentRows.rows[1]!);
    const more =
      asked('cable', { ...row, form: 'free-space' }).figure('short-db') - asked('cable', row).figure('short-db');
    expect(more).toBeCloseTo(6.0206, 4);
  });
});

describe('mismatch', () => {
  test.each(uncertainties.mismatch.computedRows.rows)(
    '$reflectionSource against $reflectionLoad is $plusDb high, $minusDb low, u $standardUncertaintyDb dB (LAB34 3.4.3, computed)',
    (row) => {
      const { figure } = asked('mismatch', { as: 'reflection', rs: row.reflectionSource, rl: row.reflectionLoad });
      expect(Math.abs(figure('high') - row.plusDb)).toBeLessThan(6e-6);
      expect(Math.abs(figure('low') + row.minusDb)).toBeLessThan(6e-6);
      expect(Math.abs(figure('u') - row.standardUncertaintyDb)).toBeLessThan(1e-5);
    },
  );
  test.each(uncertainties.mismatch.vswrRows.rows)('VSWR $vswr returns $returnLossDb dB less (computed)', (row) => {
    expect(asked('mismatch', { as: 'vswr', vs: row.vswr }).figure('loss-source')).toBeCloseTo(row.returnLossDb, 4);
  });
  test('10 dB in between make the product ten times smaller (CISPR 16-4-2 Annex A, from memory)', () => {
    const { figure } = asked('mismatch', { as: 'reflection', rs: 0.5, rl: 0.4, pad: 10 });
    expect(figure('high')).toBeCloseTo(20 * Math.log10(1.02), 9);
  });
});

describe('levels that add', () => {
  test.each(conversions.addition.rows)('$aDb and $bDb dB (definition, computed)', (row) => {
    const { figure } = asked('addition', { signal: row.aDb, ambient: row.bDb });
    expect(figure('power')).toBeCloseTo(row.powerSumDb, 4);
    expect(figure('phase')).toBeCloseTo(row.voltageSumDb, 4);
  });
  test.each(receiver.noiseAndAmbient.computedErrors.rows)(
    '$signalAboveNoiseDb dB above noise reads $readingHighByDb dB high (addition of powers, computed)',
    (row) =>
      expect(asked('addition', { signal: row.signalAboveNoiseDb, ambient: 0 }).figure('raised')).toBeCloseTo(
        row.readingHighByDb,
        4,
      ),
  );
});

describe('scan and bench time', () => {
  const BAND_CD = { start: 30, stop: 1000, rbw: 120, shape: '6', by: 'half' };
  test('bands C and D have 16 167 points (band presets, verified); half the RBW may read 1.51 dB low', () => {
    const { figure } = asked('scan', BAND_CD);
    expect(figure('sweep')).toBe(16167);
    expect(figure('low')).toBeCloseTo(1.5051, 4);
  });
  test.each(receiver.minimumScanTimes.rows)(
    'band $band: $peakScanS s in peak, $qpScanS s in quasi-peak (CISPR 16-2-1/-2-3, from memory)',
    (row) => {
      const bands = receiver.bands.rows.filter(({ band }) => row.band.split(' and ').includes(band));
      const range = { start: bands[0]!.startMHz, stop: bands.at(-1)!.stopMHz };
      expect(asked('scan', { ...range, detector: 'peak' }).figure('least')).toBeCloseTo(row.peakScanS, 6);
      expect(asked('scan', { ...range, detector: 'quasi-peak' }).figure('least')).toBeCloseTo(row.qpScanS, 4);
    },
  );
  test('a plan by hand: 2 polarisations, 4 heights, 8 azimuths of 10 s scans with their changes', () => {
    const plan = {
      lines: 1,
      polarisations: 2,
      'polarisations-s': 60,
      heights: 4,
      'heights-s': 20,
      azimuths: 8,
      'azimuths-s': 5,
      setup: 15,
    };
    // 101 frequencies of 100 ms are 10.1 s
    const { figure, sentence } = asked('scan', { start: 30, stop: 31, rbw: 20, by: 'half', dwell: 100, ...plan });
    expect(figure('time')).toBeCloseTo(10.1, 9);
    expect(figure('bench')).toBeCloseTo(900 + 60 + 2 * 3 * 20 + 8 * 7 * 5 + 64 * 10.1, 6);
    expect(sentence).toMatch(/^101 frequencies take 10\.1 s; at the bench it is 33 min/);
  });
  test('a change needs its time only where there is something to change to', () => {
    const plan = { ...BAND_CD, dwell: 1, lines: 1, polarisations: 2, heights: 1, azimuths: 1, setup: 0 };
    expect(asked('scan', plan).why('bench')).toBe('waits for each change of polarisation');
  });
  test('a range that runs backwards is refused beside its end', () => {
    const { wrong, answers } = asked('scan', { ...BAND_CD, stop: 20 });
    expect(wrong).toEqual({ stop: 'This is not above where the range starts.' });
    expect(answers.every(({ working }) => working === null)).toBe(true);
  });
});

describe('reduction', () => {
  test('over by 6.2 within ±4.9 has to come down by more than 11.1 dB', () => {
    const { figure, sentence } = asked('reduction', { level: '46,2', limit: 40, goal: 'u', u: 4.9 });
    expect(figure('reduction')).toBeCloseTo(11.1, 9);
    expect(figure('factor')).toBeCloseTo(10 ** (-11.1 / 20), 9);
    expect(sentence).toBe('Now 6.2 dB over; it has to come down by more than 11.10 dB.');
  });
  test('a margin that is reached misses nothing; exactly U still does (JCGM 106:2012)', () => {
    expect(asked('reduction', { level: 30, limit: 40, goal: 'margin', target: 10 }).sentence).toMatch(
      /nothing is missing/,
    );
    expect(asked('reduction', { level: 35, limit: 40, goal: 'u', u: 5 }).sentence).toMatch(/more than 0\.00 dB/);
  });
});

/** One full set of entries for each pane, so that every working is looked at. */
const FULL: Record<string, Entries[]> = {
  levels: ['dBm', 'dBuV', 'dBuA', 'V', 'mV', 'uV'].map((unit) => ({ unit, level: '12,5', ohm: '50' })),
  field: [
    {
      unit: 'dBm',
      reading: '-68',
      af: '13.05',
      loss: '1.2',
      gain: '30',
      limit: '40',
      rule: '20',
      f: '100',
      from: '3',
      to: '10',
    },
    { unit: 'dBuV', reading: '52', af: '-3', limit: '40' },
  ],
  distance: [{ rule: '47cfr', f: '13.56', from: '10', to: '3', extent: '0.5', level: '50' }],
  antenna: [
    { have: 'gain', gain: '-4', f: '40', load: '50' },
    { have: 'af', af: '7', f: '1 GHz', load: '75' },
  ],
  eirp: ['eirp', 'erp', 'field'].map((have) => ({ have, level: '-12', d: '0.5' })),
  plane: ['e', 'h', 's'].map((unit) => ({ unit, level: '-12' })),
  cable: [{ limit: '40', d: '3', f: '50', length: '1', form: 'free-space' }],
  mismatch: [
    { as: 'vswr', vs: '2', vl: '1.5', pad: '6' },
    { as: 'reflection', rs: '0.3', rl: '0.2' },
  ],
  addition: [
    { signal: '40', ambient: '34' },
    { signal: '40', ambient: '34', third: '20' },
  ],
  scan: [
    {
      start: '150 kHz',
      stop: '1000',
      rbw: '120',
      shape: '3',
      by: 'typed',
      step: '40',
      dwell: '1',
      detector: 'peak',
      lines: '1',
      polarisations: '2',
      'polarisations-s': '30',
      heights: '1',
      azimuths: '1',
      setup: '10',
    },
  ],
  reduction: [
    { level: '46', limit: '40', goal: 'u', u: '4.9' },
    { level: '46', limit: '40', goal: 'margin', target: '3' },
  ],
};

describe.each(PANES)('$title', ({ id }) => {
  const outcomes = () => FULL[id]!.map((entries) => asked(id, entries));

  test('typed in full every figure is answered, each with its source, and the sentence says one', () => {
    for (const { answers, problems, wrong, sentence } of outcomes()) {
      expect({ problems, wrong: wrong ?? {} }).toEqual({ problems: {}, wrong: {} });
      for (const { working } of answers) {
        expect(working).not.toBeNull();
        expect(working!.source).not.toBe('');
        expect(Number.isFinite(working!.result.value)).toBe(true);
      }
      expect(sentence).toMatch(/\d.*\.$/);
    }
  });

  test('the terms of every sum and product make its figure', () => {
    for (const { answers } of outcomes()) for (const one of answers) expect(madeOf(one)).toBe(true);
  });

  test('with nothing typed no figure is answered and each says what it waits for', () => {
    const { answers, sentence, cautions, problems } = asked(id, {});
    expect(answers.map(({ because }) => because)).toEqual(answers.map(() => expect.stringMatching(/^waits for /)));
    expect({ sentence, cautions, problems }).toEqual({ sentence: null, cautions: [], problems: {} });
  });

  test('names of answers and fields are each used once', () => {
    const { answers, fields } = outcomes()[0]!;
    expect(new Set(answers.map((one) => one.id)).size).toBe(answers.length);
    expect(new Set(fields.map(({ name }) => name)).size).toBe(fields.length);
    expect(fields.some(({ name }) => name === 'pane' || name === 'show')).toBe(false);
  });
});

function madeOf({ working }: Answer): boolean {
  const { terms, result } = working!;
  if (terms.length === 0) return working!.formula !== null;
  const step = (made: number, { sign, quantity }: Term): number => {
    if (quantity === null) return made;
    if (sign === '×') return made * quantity.value;
    if (sign === '÷') return made / quantity.value;
    return sign === '−' ? made - quantity.value : made + quantity.value;
  };
  const made = terms.reduce(step, 0);
  return (
    Math.abs(made - result.value) <= 1e-9 * Math.max(1e-3, Math.abs(result.value)) ||
    Math.abs(made / result.value - 1) < 1e-9
  );
}

test('an unknown pane is the first', () => {
  expect(paneOf('nothing')).toBe(PANES[0]);
  expect(paneOf(null)).toBe(PANES[0]);
});

test.each([
  ['calculator', PANES.map(({ id }) => id)],
  ['Calc', PANES.map(({ id }) => id)],
  ['mismatch', ['mismatch']],
  ['field strength', ['field', 'eirp']],
  ['common-mode', ['cable']],
  ['LD-40', []],
  ['un', []],
  ['', []],
])('Find by %j offers the calculations that carry it', (words, ids) => {
  expect(findPanes(words).map(({ id }) => id)).toEqual(ids);
});
