import { equipmentFinding, dueWords, mostUrgentFirst } from '@/app/(lab)/equipment/equipmentWords';
import { percentOf, stripScale } from '@/app/(lab)/equipment/calibrationScale';
import { jobsFinding, type JobStands } from '@/app/(lab)/jobs/jobsFinding';
import { runListFinding } from '@/app/(lab)/samples/runListFinding';
import { sampleFinding, type Stands } from '@/app/(lab)/samples/sampleFinding';
import { latestOfEachPort, portsOf, worstRun, type Run } from '@/app/(lab)/samples/worstRun';
import { findingText } from '@/format/finding';

function run(number: string, more: Partial<Run>): Run {
  return {
    id: number.padEnd(16, '0').toLowerCase(),
    number,
    jobNumber: 'HL-2611',
    product: 'LD-40',
    state: 'M0',
    port: 'enclosure',
    purpose: 'final',
    line: null,
    polarisation: 'horizontal',
    keptAt: '2026-11-17T10:42:00.000Z',
    by: 'Mira Solt',
    organisation: { id: 'o'.repeat(16), name: 'Pell & Orrin Lighting' },
    verdict: 'under',
    worst: { frequencyHz: 144.018e6, marginDb: 9 },
    points: 12934,
    sample: { id: 's'.repeat(16), code: 'S-047' },
    trial: null,
    partial: false,
    voided: false,
    strayed: null,
    ...more,
  };
}
const at = (marginDb: number, frequencyHz = 144.018e6) => ({ frequencyHz, marginDb, uncertaintyDb: 4.9 });

describe('which run governs', () => {
  test('the verdict decides before the margin, the margin before the order', () => {
    const runs = [
      run('R-1', { verdict: 'needs-final', worst: at(-9) }),
      run('R-2', { verdict: 'over', worst: at(-5.1) }),
      run('R-3', { verdict: 'over', worst: at(-6.2) }),
    ];
    expect(worstRun(runs)?.number).toBe('R-3');
    expect(runs.map(({ number }) => number)).toEqual(['R-1', 'R-2', 'R-3']);
  });
  test('an ambient run is without the sample and never governs', () => {
    expect(worstRun([run('R-1', { purpose: 'ambient', verdict: 'over', worst: at(-20) })])).toBeNull();
    expect(portsOf([run('R-1', { purpose: 'ambient' })])).toEqual([]);
  });
  test('each port stands at the newest state it was measured in; M10 is newer than M9', () => {
    const runs = [
      run('R-1', { state: 'M9' }),
      run('R-2', { state: 'M10' }),
      run('R-3', { state: 'M2', port: 'ac-mains', polarisation: null, line: 'L' }),
    ];
    expect(latestOfEachPort(runs).map((own) => own.map(({ number }) => number))).toEqual([['R-2'], ['R-3']]);
  });
});

describe('the sentence of a sample', () => {
  const enclosure: Stands = { port: 'enclosure', state: 'M2', verdict: 'over', missing: [], worst: at(-6.2) };
  const mains: Stands = { ...enclosure, port: 'ac-mains', verdict: 'under', worst: at(7, 0.195e6) };
  const said = (...standings: Stands[]) => findingText(sampleFinding(standings).runs);

  test.each([
    ['over', [mains, enclosure], 'Over by 6.2 dB at 144.018 MHz, enclosure in M2. AC mains is under.'],
    [
      'better than at first',
      [{ ...enclosure, first: { state: 'M0', marginDb: -11.4 } }],
      'Over by 6.2 dB at 144.018 MHz, enclosure in M2, 5.2 dB better than M0.',
    ],
    [
      'worse than at first',
      [{ ...enclosure, first: { state: 'M0', marginDb: -4.2 } }],
      'Over by 6.2 dB at 144.018 MHz, enclosure in M2, 2.0 dB worse than M0.',
    ],
    [
      'no difference is not called one',
      [{ ...enclosure, first: { state: 'M0', marginDb: -6.22 } }],
      'Over by 6.2 dB at 144.018 MHz, enclosure in M2.',
    ],
    [
      'a port last measured in an older state says so',
      [enclosure, { ...mains, state: 'M1', verdict: 'inconclusive' as const }],
      'Over by 6.2 dB at 144.018 MHz, enclosure in M2. AC mains is inconclusive in M1.',
    ],
    [
      'inconclusive',
      [{ ...mains, verdict: 'inconclusive' as const, worst: at(-1.7, 0.195e6) }],
      '1.7 dB over at 0.195 MHz, AC mains in M2, within ±4.9 dB: inconclusive.',
    ],
    [
      'needs a final',
      [{ ...enclosure, verdict: 'needs-final' as const }],
      '6.2 dB over at 144.018 MHz, enclosure in M2: this needs a final.',
    ],
    [
      'one polarisation is never under',
      [
        {
          ...enclosure,
          verdict: 'not-covered' as const,
          missing: ['Vertical polarisation is not measured.'],
          worst: at(2),
        },
      ],
      'Enclosure is not covered in M2. Vertical polarisation is not measured. What was measured is closest at 144.018 MHz, 2.0 dB under.',
    ],
    [
      'on the limit',
      [{ ...enclosure, verdict: 'inconclusive' as const, worst: at(0.04) }],
      'On the limit at 144.018 MHz, enclosure in M2, within ±4.9 dB: inconclusive.',
    ],
    ['nothing', [], 'Nothing is measured yet.'],
  ])('%s', (_name, standings, sentence) => expect(said(...(standings as Stands[]))).toBe(sentence));

  test('the glyph is that of the governing port', () => {
    expect(sampleFinding([mains, enclosure]).verdict).toBe('over');
    expect(sampleFinding([]).verdict).toBe('not-covered');
  });
});

describe('the sentence of the run list', () => {
  const runs = [run('R-1', { verdict: 'under' }), run('R-2', { verdict: 'over' }), run('R-3', { verdict: 'under' })];
  test.each([
    [runs, true, true, 'Three runs are kept: one is over; two are under.'],
    [runs, true, false, 'Of the newest three runs, one is over; two are under.'],
    [runs, false, true, 'Of the next three runs, one is over; two are under.'],
    [runs.slice(0, 1), true, true, 'One run is kept: one is under.'],
    [[], true, true, 'No run is kept yet.'],
  ])('%#', (list, newest, whole, sentence) =>
    expect(findingText(runListFinding(list, newest, whole).runs)).toBe(sentence),
  );
});

describe('the sentence of the jobs', () => {
  const over: JobStands = { number: 'HL-2611', stands: { verdict: 'over', state: 'M2', worst: at(-6.2) } };
  const uncovered: JobStands = { number: 'HL-2614', stands: { verdict: 'not-covered', state: 'M0', worst: at(2) } };
  const idle: JobStands = { number: 'HL-2615', stands: null };
  test.each([
    [
      [uncovered, over],
      5,
      true,
      'Two jobs are open. HL-2611 is over by 6.2 dB at 144.018 MHz in M2; one is not covered.',
    ],
    [[uncovered, idle], 2, true, 'Two jobs are open. None is over; one is not covered; one is not measured yet.'],
    [[idle], 25, false, 'Of these 25 jobs one is open. One is not measured yet.'],
    [
      [over, over, over],
      3,
      true,
      'Three jobs are open. HL-2611 is over by 6.2 dB at 144.018 MHz in M2; HL-2611 is over by 6.2 dB at 144.018 MHz in M2; one more is over.',
    ],
    [[], 0, true, 'No jobs are open.'],
  ])('%#', (open, shown, whole, sentence) => expect(findingText(jobsFinding(open, shown, whole).runs)).toBe(sentence));
});

describe('equipment', () => {
  const item = (
    identifier: string,
    due: 'in-date' | 'due-soon' | 'lapsed' | 'not-calibrated',
    dueOn: string | null,
    state: 'in-use' | 'quarantined' | 'retired' = 'in-use',
  ) => ({ identifier, due, dueOn, state, calibratedOn: '2025-11-01' });
  const lapsed = item('AMN-2', 'lapsed', '2026-10-02', 'quarantined');
  const soon = item('ANT-02', 'due-soon', '2026-11-26');
  const fine = item('AMN-1', 'in-date', '2027-02-20');
  const today = '2026-11-17';
  test.each([
    [[fine, soon, lapsed], 'inconclusive', 'AMN-2 lapsed on 2 Oct 2026 and is quarantined. ANT-02 is due in 9 days.'],
    [
      [{ ...lapsed, state: 'in-use' as const }, fine],
      'over',
      'AMN-2 lapsed on 2 Oct 2026 and is still in use. Next is AMN-1, due 20 Feb 2027.',
    ],
    [[fine], 'under', 'Everything with a due date is in date; next is AMN-1, due 20 Feb 2027.'],
    [[item('PRE-1', 'not-calibrated', null)], 'under', 'Nothing has a due date.'],
    [[{ ...lapsed, state: 'retired' as const }], 'not-covered', 'No equipment is entered yet.'],
  ])('%#', (items, verdict, sentence) => {
    const finding = equipmentFinding(items, today);
    expect(findingText(finding.runs)).toBe(sentence);
    expect(finding.verdict).toBe(verdict);
  });
  test('due states in words', () => {
    expect(dueWords(lapsed, today)).toBe('lapsed 46 days, quarantined');
    expect(dueWords(soon, today)).toBe('due in 9 days');
    expect(dueWords(fine, today)).toBe('in date');
  });
  test('what asks for somebody comes first, ANT-2 before ANT-10', () => {
    const ten = item('ANT-10', 'in-date', '2027-01-01');
    const two = item('ANT-2', 'in-date', '2027-01-01');
    expect([ten, fine, two, soon, lapsed].sort(mostUrgentFirst).map(({ identifier }) => identifier)).toEqual([
      'AMN-2',
      'ANT-02',
      'AMN-1',
      'ANT-2',
      'ANT-10',
    ]);
  });

  test('a strip runs over whole months around today, whatever the month', () => {
    for (const day of ['2026-01-31', '2026-11-17', '2028-02-29', '2026-12-01']) {
      const scale = stripScale(day);
      expect([scale.fromDay.slice(8), scale.toDay.slice(8)]).toEqual(['01', '01']);
      const todayAt = percentOf(day, scale);
      expect(todayAt).toBeGreaterThan(30);
      expect(todayAt).toBeLessThan(45);
      expect(percentOf(scale.fromDay, scale)).toBe(0);
      expect(percentOf(scale.toDay, scale)).toBe(100);
      const labelled = scale.ticks.filter(({ label }) => label !== null);
      expect(labelled.length).toBeGreaterThan(1);
      for (const [i, tick] of labelled.entries()) {
        expect(Math.abs(tick.percent - todayAt)).toBeGreaterThan(8);
        const next = labelled[i + 1];
        if (next) expect(next.percent - tick.percent).toBeGreaterThan(tick.label!.length * 2.5);
      }
    }
  });
});
