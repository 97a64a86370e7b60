import {
  budgetBodyOf,
  budgetDraftOf,
  contributionOf,
  EMPTY_ROW,
  liveBudget,
  liveUcispr,
  type BudgetDraft,
  type RowDraft,
} from '@/components/forms/budgetDraft';
import { reviseUncertaintyBody, type UncertaintyView } from '@/schemas/paths';

const row = (value: string, more: Partial<RowDraft> = {}): RowDraft => {
  return { ...EMPTY_ROW, name: 'site', value, source: 'tests', ...more };
};
const draft = (prescan: RowDraft[], final: RowDraft[]): BudgetDraft => {
  const range = { from: '150 kHz', to: '30 MHz' };
  return {
    prescan: [{ ...range, rows: prescan }],
    final: [{ ...range, rows: final }],
    uncertaintySource: 'x',
    reason: 'y',
  };
};

test('a comma is a point, and a row says which of its fields keep it from being a contribution', () => {
  expect(contributionOf(row('1,5'))).toMatchObject({ contribution: { valueDb: 1.5 } });
  expect(contributionOf(row('-1'))).toEqual({ wrong: ['value'] });
  expect(contributionOf({ ...row(''), k: '0', sensitivity: 'x', degrees: '0', source: ' ', name: '' })).toEqual({
    wrong: ['name', 'value', 'k', 'sensitivity', 'degrees', 'source'],
  });
  expect(contributionOf(row('1', { shape: 'rectangular', k: '' }))).toMatchObject({
    contribution: { distribution: { shape: 'rectangular' } },
  });
});

test('what is whole is combined while the rest is still typed', () => {
  const { ranges } = liveBudget(draft([row('3', { k: '1' }), row('')], [row('4', { k: '1' }), row('3', { k: '1' })]));
  expect(ranges.prescan[0]!.result!.expandedDb).toBe(6);
  expect(ranges.prescan[0]!.rows).toEqual([{ contributedDb: 3, share: 1 }, null]);
  expect(ranges.final[0]!.result!.expandedDb).toBe(10);
  expect(ranges.final[0]!.rows.map((one) => one!.share)).toEqual([expect.closeTo(0.64, 12), expect.closeTo(0.36, 12)]);
});

test('a prescan below the final is named with its range and both figures', () => {
  expect(liveBudget(draft([row('2')], [row('3')])).below).toEqual([
    { fromHz: 150e3, toHz: 30e6, prescanDb: 2, finalDb: 3 },
  ]);
  expect(liveBudget(draft([row('3')], [row('3')])).below).toEqual([]);
});

test('CISPR 16-4-2:2011 Table 1 (from memory): 3.4 dB for an AMN from 150 kHz to 30 MHz', () => {
  const [range] = draft([], []).final;
  expect(liveUcispr('ac-mains', range!, 3.4)).toMatchObject([{ ucisprDb: 3.4, excessDb: 0 }]);
  expect(liveUcispr('ac-mains', range!, 4.2)).toMatchObject([{ excessDb: expect.closeTo(0.8, 12) }]);
  expect(liveUcispr('wired-network', { ...range!, from: '1 GHz', to: '6 GHz' }, 4)).toEqual([]);
});

test('the body is what the operation takes, or the fields that are not whole', () => {
  const made = budgetBodyOf(draft([row('3')], [row('3')]));
  expect('body' in made && reviseUncertaintyBody.parse(made.body).budget.final[0]).toMatchObject({
    startHz: 150e3,
    stopHz: 30e6,
    contributions: [{ valueDb: 3, distribution: { shape: 'normal', k: 2 }, degreesOfFreedom: null }],
  });
  const bad = draft([row('')], [row('3')]);
  bad.final[0]!.to = '100 kHz';
  expect(budgetBodyOf(bad)).toEqual({ wrong: ['prescan/0/rows/0/value', 'final/0/to'] });
});

test('a stated figure opens as an empty row, a budget as it stands', () => {
  const step = { startHz: 150e3, stopHz: 30e6, expandedDb: 4, budget: null, ucispr: [] };
  const views: UncertaintyView[] = [
    { ...step, purpose: 'prescan' },
    { ...step, purpose: 'final' },
  ];
  expect(budgetDraftOf(views, 'stated')).toMatchObject({
    prescan: [{ from: '150 kHz', to: '30 MHz', rows: [EMPTY_ROW] }],
    uncertaintySource: '',
  });
  const budgetRow = {
    name: 'site',
    valueDb: 4,
    distribution: { shape: 'normal' as const, k: 1 },
    sensitivity: 1,
    source: 'tests',
    degreesOfFreedom: 9,
    divisor: 1,
    standardDb: 4,
    contributedDb: 4,
    shareOfVariance: 1,
  };
  const budget = {
    rows: [budgetRow],
    combinedDb: 4,
    effectiveDegreesOfFreedom: 9,
    coverageFactor: 2.3,
    expandedDb: 9.2,
  };
  const { final, uncertaintySource } = budgetDraftOf([{ ...views[1]!, budget }], 'certificates');
  expect(final[0]!.rows).toEqual([
    { name: 'site', value: '4', shape: 'normal', k: '1', sensitivity: '1', degrees: '9', source: 'tests' },
  ]);
  expect(uncertaintySource).toBe('certificates');
});
