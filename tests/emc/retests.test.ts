import fc from 'fast-check';
import { groupEmissions, type Place } from '@/emc/emissions';
import type { Polarisation, Purpose, Verdict } from '@/emc/kinds';
import { portVerdict } from '@/emc/port';
import { positionOf, standAt, sweptBy, voicesOf, type Reading, type RetestRun, type Standing } from '@/emc/retests';
import { judgeEmission, readsWorse } from '@/emc/retestStatus';
import type { CoverageGap } from '@/emc/types';
import { worstVerdict } from '@/emc/verdict';

const LINE = { id: 'qp', name: 'the quasi-peak line', asked: [{ fromHz: 30e6, toHz: 1e9 }] };
const RBW_HZ = 120e3;
const AT: Place = { kind: 'peak', fromHz: 144e6, toHz: 144e6, bandwidthHz: RBW_HZ };

const reading = (verdict: Verdict, frequencyHz = 144e6, marginDb = 0): Reading => ({
  kind: 'peak',
  fromHz: frequencyHz,
  toHz: frequencyHz,
  frequencyHz,
  bandwidthHz: RBW_HZ,
  lineId: 'qp',
  verdict,
  marginDb,
});
const gap = (fromHz: number, toHz: number, because: CoverageGap['because'] = 'no-trace'): CoverageGap => ({
  lineId: 'qp',
  fromHz,
  toHz,
  because,
});

let id = 0;
function run(purpose: Purpose, readings: Reading[], more: Partial<RetestRun> = {}): RetestRun {
  const verdict = worstVerdict(readings.map((one) => one.verdict)) ?? 'under';
  const where = { polarisation: 'horizontal' as Polarisation, line: null, heightM: null, heightSwept: true };
  return { id: ++id, purpose, ...where, verdict, gaps: [], lines: [LINE], readings, spotsHz: [], ...more };
}
const prescan = (verdict: Verdict, more: Partial<RetestRun> = {}) => run('prescan', [reading(verdict)], more);
const final = (verdict: Verdict, more: Partial<RetestRun> = {}) => run('final', [reading(verdict)], more);

const standing = (runs: RetestRun[], position: Polarisation = 'horizontal') =>
  standAt('enclosure', voicesOf(runs, 'qp', [AT]), position, AT).standing;
const judge = (runs: RetestRun[], more: Partial<Parameters<typeof judgeEmission>[1]> = {}) =>
  judgeEmission(voicesOf(runs, 'qp', [AT]), {
    port: 'enclosure',
    place: AT,
    positions: ['horizontal'],
    claimed: true,
    swept: null,
    ...more,
  });

describe('how an emission stands at a position', () => {
  const spotGap = gap(30e6, 1e9, 'gap');
  test.each<[string, RetestRun[], Standing]>([
    ['a prescan that needs a final waits', [prescan('needs-final')], 'waits'],
    ['a prescan that is over waits', [prescan('over')], 'waits'],
    ['a final alone that is over waits', [final('over')], 'waits'],
    ['a final confirms over', [prescan('needs-final'), final('over')], 'over'],
    ['a second final confirms over', [final('over'), final('over')], 'over'],
    ['a final settles a prescan as inconclusive', [prescan('needs-final'), final('inconclusive')], 'inconclusive'],
    ['a final settles a prescan as under', [prescan('needs-final'), final('under')], 'under'],
    ['a final that lists nothing there covers it', [prescan('needs-final'), run('final', [])], 'under'],
    ['a final does not settle a prescan that was over', [prescan('over'), final('under')], 'contradicted'],
    ['of two finals the worst governs, first', [prescan('needs-final'), final('over'), final('under')], 'over'],
    [
      'of two finals the worst governs, last',
      [prescan('needs-final'), final('under'), final('inconclusive')],
      'inconclusive',
    ],
    ['a final that cannot decide leaves it waiting', [prescan('needs-final'), final('needs-final')], 'waits'],
    ['a final in part settles nothing', [prescan('needs-final'), final('inconclusive', { partial: true })], 'waits'],
    ['a final in part that is over counts', [prescan('needs-final'), final('over', { partial: true })], 'waits'],
    [
      'a final of the other polarisation settles nothing',
      [prescan('needs-final'), final('under', { polarisation: 'vertical' })],
      'waits',
    ],
    [
      'a final with a gap there and nothing read settles nothing',
      [prescan('needs-final'), run('final', [], { gaps: [gap(100e6, 200e6)] })],
      'waits',
    ],
    [
      'a final with a gap elsewhere settles it',
      [prescan('needs-final'), run('final', [], { gaps: [gap(200e6, 300e6)] })],
      'under',
    ],
    [
      'a spot tuned to it settles it',
      [prescan('needs-final'), run('final', [reading('under', 144.05e6)], { gaps: [spotGap] })],
      'under',
    ],
    [
      'a spot further off than half the bandwidth does not',
      [prescan('needs-final'), run('final', [reading('under', 144.09e6)], { gaps: [spotGap] })],
      'waits',
    ],
    [
      'a spot that is not among the listed settles it',
      [prescan('needs-final'), run('final', [], { gaps: [spotGap], spotsHz: [144.02e6] })],
      'under',
    ],
    [
      'the first spot, beyond which nothing was traced, settles it',
      [
        prescan('needs-final'),
        run('final', [], { gaps: [gap(30e6, 144.02e6), gap(144.02e6, 1e9, 'gap')], spotsHz: [144.02e6] }),
      ],
      'under',
    ],
    [
      'a spot of a detector that the line was not traced with settles nothing',
      [prescan('needs-final'), run('final', [], { gaps: [gap(30e6, 1e9)], spotsHz: [144e6] })],
      'waits',
    ],
    [
      'a spot without a factor beside a gap settles nothing',
      [
        prescan('needs-final'),
        run('final', [], {
          gaps: [gap(30e6, 144e6, 'gap'), gap(144e6, 1e9, 'no-factor')],
          spotsHz: [144e6],
        }),
      ],
      'waits',
    ],
    [
      'a spot without a factor settles nothing',
      [prescan('needs-final'), run('final', [], { gaps: [gap(100e6, 200e6, 'no-factor')], spotsHz: [144e6] })],
      'waits',
    ],
    [
      'a final compared with another line settles nothing',
      [prescan('needs-final'), run('final', [], { lines: [{ ...LINE, id: 'av' }] })],
      'waits',
    ],
    [
      'a line that no longer reaches there is silent',
      [run('final', [], { lines: [{ ...LINE, asked: [{ fromHz: 200e6, toHz: 1e9 }] }] })],
      'silent',
    ],
    ['a prescan that shows under is under', [run('prescan', [])], 'under'],
    [
      'one antenna height proves nothing about the others',
      [prescan('needs-final', { heightSwept: false, heightM: 1 }), final('under', { heightSwept: false, heightM: 1 })],
      'one-height',
    ],
    [
      'two heights do',
      [prescan('needs-final', { heightSwept: false, heightM: 1 }), final('under', { heightSwept: false, heightM: 2 })],
      'under',
    ],
    ['nothing measured is silent', [], 'silent'],
  ])('%s', (_says, runs, expected) => expect(standing(runs)).toBe(expected));

  test('it does not depend on the order of the runs', () => {
    fc.assert(
      fc.property(anyRuns, fc.constantFrom('horizontal' as const, 'vertical' as const), (runs, position) => {
        expect(standing([...runs].reverse(), position)).toBe(standing(runs, position));
      }),
    );
  });
});

describe('how an emission stands over its positions', () => {
  const vertical = { polarisation: 'vertical' as const };
  const both = { positions: ['horizontal', 'vertical'] as const };
  test('it waits while one position does', () => {
    const runs = [prescan('needs-final'), final('under'), prescan('needs-final', vertical)];
    expect(judge(runs, both)).toMatchObject({ status: 'waiting', governing: { position: 'vertical' } });
    expect(judge([...runs, final('under', vertical)], both)).toMatchObject({ status: 'cleared' });
    expect(judge([...runs, final('inconclusive', vertical)], both)).toMatchObject({ status: 'measured' });
  });
  test('after a modification it is measured by a final, and cleared only once the prescan of its position is repeated', () => {
    const runs = [final('under')];
    expect(judge(runs, { swept: () => false })).toMatchObject({ status: 'measured', unswept: ['horizontal'] });
    expect(judge(runs, { swept: () => true })).toMatchObject({ status: 'cleared' });
    expect(judge([], { swept: () => true })).toMatchObject({ status: 'waiting', governing: { standing: 'silent' } });
  });
  test('what no reading asks for any more is gone, unless finals looked', () => {
    expect(judge([run('prescan', [])], { claimed: false })).toMatchObject({ status: 'gone' });
    expect(judge([run('prescan', []), run('final', [])], { claimed: false })).toMatchObject({ status: 'cleared' });
    expect(judge([final('inconclusive')], { claimed: false })).toMatchObject({ status: 'measured' });
  });

  /** A run of one position with readings around 144 MHz; its verdict is the worst of them, as evaluating makes it. */
  test('it agrees with the verdict of the port: under means all cleared, and what is waiting over makes it over', () => {
    let under = 0;
    fc.assert(
      fc.property(anyRuns, (runs) => {
        const port = portVerdict('enclosure', runs);
        const asking = runs.flatMap((one) =>
          one.readings
            .filter(({ verdict }) => verdict === 'over' || verdict === 'needs-final')
            .map((seen) => ({ ...seen, run: one })),
        );
        for (const emission of groupEmissions(asking)) {
          const positions = [...new Set(emission.sightings.map((seen) => positionOf('enclosure', seen.run)))];
          const asked = { port: 'enclosure' as const, place: emission, positions, claimed: true, swept: null };
          const { status, governing } = judgeEmission(voicesOf(runs, 'qp', [emission]), asked);
          if (port.verdict === 'under') {
            under++;
            expect(status).toBe('cleared');
          }
          if (governing.reading?.verdict === 'over') expect(port.verdict).toBe('over');
          if (status === 'cleared') expect(emission.sightings.every(({ verdict }) => verdict !== 'over')).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
    expect(under).toBeGreaterThan(20);
  });
  test('a run in part never clears an emission', () => {
    fc.assert(
      fc.property(
        anyRuns,
        fc.constantFrom<Verdict>('over', 'needs-final', 'inconclusive', 'not-covered'),
        (runs, verdict) => {
          const positions = ['horizontal' as const];
          const before = judge(runs, { positions });
          const after = judge([...runs, final(verdict, { partial: true, gaps: [gap(30e6, 1e9, 'partial')] })], {
            positions,
          });
          if (after.status === 'cleared') expect(before.status).toBe('cleared');
          if (before.governing.standing === 'waits') expect(after.governing.standing).not.toBe('under');
        },
      ),
    );
  });
});

const anyRun = fc
  .record({
    purpose: fc.constantFrom<Purpose>('prescan', 'final'),
    polarisation: fc.constantFrom<Polarisation>('horizontal', 'vertical'),
    readings: fc.array(
      fc.record({
        khz: fc.integer({ min: 143_700, max: 144_300 }),
        verdict: fc.integer({ min: 0, max: 9 }),
        margin: fc.integer({ min: -9, max: 9 }),
      }),
      { maxLength: 3 },
    ),
  })
  .map(({ purpose, polarisation, readings }) =>
    run(
      purpose,
      readings.map(({ khz, verdict, margin }) => {
        const open: Verdict = purpose === 'final' ? 'inconclusive' : 'needs-final';
        return reading(verdict === 0 ? 'over' : verdict < 4 ? open : 'under', khz * 1e3, margin);
      }),
      { polarisation },
    ),
  );
const anyRuns = fc.array(anyRun, { maxLength: 7 });

describe('a prescan repeated', () => {
  const half = (fromHz: number, toHz: number) => run('prescan', [], { gaps: [gap(fromHz, toHz)] });
  test('by one run over all of a line, or by several that leave nothing open together', () => {
    const whole = run('prescan', []);
    expect(sweptBy('enclosure', [whole], 'horizontal', ['qp'])).toBe(whole);
    const [low, high] = [half(300e6, 1e9), half(30e6, 300e6)];
    expect(sweptBy('enclosure', [low], 'horizontal', ['qp'])).toBeNull();
    expect(sweptBy('enclosure', [high, low], 'horizontal', ['qp'])).toBe(high);
  });
  test('not by the other position, in part, or against another line', () => {
    expect(sweptBy('enclosure', [run('prescan', [], { polarisation: 'vertical' })], 'horizontal', ['qp'])).toBeNull();
    expect(sweptBy('enclosure', [run('prescan', [], { partial: true })], 'horizontal', ['qp'])).toBeNull();
    expect(sweptBy('enclosure', [run('prescan', [])], 'horizontal', ['qp', 'av'])).toBeNull();
    expect(sweptBy('enclosure', [], 'horizontal', [])).toBeNull();
  });
});

test('an emission reads worse by its verdict or by a margin a sheet can show', () => {
  const before = { verdict: 'needs-final' as const, marginDb: 2 };
  expect(readsWorse(before, { verdict: 'over', marginDb: 2 })).toBe(true);
  expect(readsWorse(before, { verdict: 'needs-final', marginDb: 1.9 })).toBe(true);
  expect(readsWorse(before, { verdict: 'needs-final', marginDb: 1.96 })).toBe(false);
  expect(readsWorse(before, { verdict: 'inconclusive', marginDb: 2.5 })).toBe(false);
  expect(readsWorse(before, { verdict: null, marginDb: null })).toBe(false);
});
