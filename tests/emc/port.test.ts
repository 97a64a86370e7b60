import type { MainsLine, Polarisation, Port, Verdict } from '@/emc/kinds';
import { portVerdict, type PortRun } from '@/emc/port';
import type { CoverageGap } from '@/emc/types';
import { missingText } from '@/format/missing';

const LINE = { id: 'qp', name: 'the quasi-peak line' };
const gap = (fromMhz: number, toMhz: number, because: CoverageGap['because'] = 'no-trace'): CoverageGap => ({
  lineId: 'qp',
  fromHz: fromMhz * 1e6,
  toHz: toMhz * 1e6,
  because,
});
const run = (verdict: Verdict, more: Partial<PortRun> = {}): PortRun => ({
  purpose: 'prescan',
  polarisation: null,
  line: null,
  heightM: null,
  heightSwept: true,
  verdict,
  gaps: [],
  lines: [LINE],
  ...more,
});
const at = (polarisation: Polarisation, verdict: Verdict, more: Partial<PortRun> = {}) =>
  run(verdict, { polarisation, ...more });
const on = (line: MainsLine, verdict: Verdict, more: Partial<PortRun> = {}) => run(verdict, { line, ...more });

/** The verdict, and what is missing as a reader sees it. */
const said = (port: Port, runs: PortRun[]) => {
  const { verdict, missing } = portVerdict(port, runs);
  return { verdict, missing: missing.map(missingText) };
};

describe('the verdict of a port over its runs', () => {
  test.each<[string, Port, PortRun[], Verdict, string[]]>([
    [
      'no run at all',
      'enclosure',
      [],
      'not-covered',
      ['Horizontal polarisation is not measured.', 'Vertical polarisation is not measured.'],
    ],
    [
      'one polarisation',
      'enclosure',
      [at('horizontal', 'under')],
      'not-covered',
      ['Vertical polarisation is not measured.'],
    ],
    ['both polarisations under', 'enclosure', [at('horizontal', 'under'), at('vertical', 'under')], 'under', []],
    [
      'one over, the other missing',
      'enclosure',
      [at('horizontal', 'over')],
      'over',
      ['Vertical polarisation is not measured.'],
    ],
    [
      'one needs a final',
      'enclosure',
      [at('horizontal', 'needs-final'), at('vertical', 'inconclusive')],
      'needs-final',
      [],
    ],
    ['one inconclusive', 'enclosure', [at('horizontal', 'inconclusive'), at('vertical', 'under')], 'inconclusive', []],
    [
      'needs a final but not covered',
      'enclosure',
      [at('horizontal', 'needs-final')],
      'not-covered',
      ['Vertical polarisation is not measured.'],
    ],
    [
      'no polarisation noted',
      'enclosure',
      [run('under')],
      'not-covered',
      ['Horizontal polarisation is not measured.', 'Vertical polarisation is not measured.'],
    ],
    [
      'an ambient run in the missing one',
      'enclosure',
      [at('horizontal', 'under'), at('vertical', 'not-covered', { purpose: 'ambient' })],
      'not-covered',
      ['Vertical polarisation is not measured.'],
    ],
    [
      'an ambient run said to be over',
      'enclosure',
      [at('horizontal', 'under'), at('vertical', 'under'), at('vertical', 'over', { purpose: 'ambient' })],
      'under',
      [],
    ],
    ['mains L alone', 'ac-mains', [on('L', 'under')], 'not-covered', ['Neutral N is not measured.']],
    ['mains L and N', 'ac-mains', [on('L', 'under'), on('N', 'under')], 'under', []],
    [
      'three-phase begun',
      'ac-mains',
      [on('L1', 'under'), on('N', 'under')],
      'not-covered',
      ['Line L2 is not measured.', 'Line L3 is not measured.'],
    ],
    [
      'three-phase whole',
      'ac-mains',
      [on('L1', 'under'), on('L2', 'under'), on('L3', 'inconclusive'), on('N', 'under')],
      'inconclusive',
      [],
    ],
    ['a wired port', 'wired-network', [run('under')], 'under', []],
    ['a wired port not measured', 'wired-network', [], 'not-covered', ['The port is not measured.']],
  ])('%s', (_, port, runs, verdict, missing) => {
    expect(said(port, runs)).toEqual({ verdict, missing });
  });
});

describe('gaps within a position', () => {
  test('a gap is named with its range, line and reason', () => {
    const runs = [on('L', 'not-covered', { gaps: [gap(10, 30, 'no-factor')] }), on('N', 'under')];
    expect(said('ac-mains', runs)).toEqual({
      verdict: 'not-covered',
      missing: ['Line L: 10.000 MHz to 30.000 MHz of the quasi-peak line, no factor in the signal path.'],
    });
  });

  test('runs of one position fill the gaps of one another; under is what is left', () => {
    const low = on('L', 'not-covered', { gaps: [gap(10, 30)] });
    const high = on('L', 'not-covered', { gaps: [gap(0.15, 10)] });
    expect(said('ac-mains', [low, high, on('N', 'under')])).toEqual({ verdict: 'under', missing: [] });
    expect(
      said('ac-mains', [low, on('N', 'under'), on('N', 'not-covered', { gaps: [gap(0.15, 10)] })]).missing,
    ).toHaveLength(1);
  });

  test('what several runs leave open is the part they all leave open', () => {
    const runs = [
      on('L', 'not-covered', { gaps: [gap(5, 20)] }),
      on('L', 'not-covered', { gaps: [gap(10, 30)] }),
      on('N', 'under'),
    ];
    expect(said('ac-mains', runs).missing).toEqual([
      'Line L: 10.000 MHz to 20.000 MHz of the quasi-peak line, not swept.',
    ]);
  });

  test('a line the one position was never compared with is missing there', () => {
    const average = { id: 'av', name: 'the average line' };
    const runs = [on('L', 'under', { lines: [LINE, average] }), on('N', 'under')];
    expect(said('ac-mains', runs)).toEqual({
      verdict: 'not-covered',
      missing: ['Neutral N is not compared with the average line.'],
    });
  });

  test('without any limit line nothing is covered', () => {
    expect(said('wired-network', [run('not-covered', { lines: [] })])).toEqual({
      verdict: 'not-covered',
      missing: ['The port: no limit line is chosen.'],
    });
  });
});

describe('heights', () => {
  const fixed = (polarisation: Polarisation, heightM: number | null) =>
    at(polarisation, 'under', { heightM, heightSwept: false });

  test('one height of a polarisation never makes the enclosure under', () => {
    expect(said('enclosure', [fixed('horizontal', 1), at('vertical', 'under')])).toEqual({
      verdict: 'not-covered',
      missing: ['Horizontal polarisation: only one antenna height, 1.00 m.'],
    });
  });

  test('a height that is not stated is no second height', () => {
    const runs = [fixed('horizontal', 1), fixed('horizontal', null), at('vertical', 'under')];
    expect(said('enclosure', runs).missing).toEqual(['Horizontal polarisation: no other antenna height is stated.']);
  });

  test('two heights, or one swept, are enough', () => {
    const runs = [fixed('horizontal', 1), fixed('horizontal', 2.5), at('vertical', 'under')];
    expect(said('enclosure', runs)).toEqual({ verdict: 'under', missing: [] });
  });

  test('a mains port has no antenna', () => {
    const none = { heightM: null, heightSwept: false };
    expect(said('ac-mains', [on('L', 'under', none), on('N', 'under', none)]).verdict).toBe('under');
  });
});

describe('a final and the prescan before it', () => {
  const final = (verdict: Verdict, more: Partial<PortRun> = {}) => on('L', verdict, { purpose: 'final', ...more });
  const rest = on('N', 'under');

  test('a final without gaps settles what a prescan left open', () => {
    expect(said('ac-mains', [on('L', 'needs-final'), final('under'), rest]).verdict).toBe('under');
    expect(said('ac-mains', [on('L', 'needs-final'), final('inconclusive'), rest]).verdict).toBe('inconclusive');
  });

  test('a final with a gap does not, nor one of another line, nor one that needs another', () => {
    const open = on('L', 'needs-final');
    expect(said('ac-mains', [open, final('under', { gaps: [gap(10, 30)] }), rest]).verdict).toBe('needs-final');
    expect(said('ac-mains', [open, final('needs-final'), rest]).verdict).toBe('needs-final');
    const other = { lines: [{ id: 'av', name: 'the average line' }] };
    expect(said('ac-mains', [open, final('under', other), rest]).verdict).not.toBe('under');
  });

  test('a prescan that proved over stays over', () => {
    expect(said('ac-mains', [on('L', 'over'), final('under'), rest]).verdict).toBe('over');
  });
});
