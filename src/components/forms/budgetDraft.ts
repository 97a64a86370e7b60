import { budgetOf, type BudgetResult, type Contribution } from '@/emc/budget';
import { prescanBelowFinal, type PrescanBelowFinal } from '@/emc/budgetSteps';
import type { Port } from '@/emc/kinds';
import { besideUcispr, type BesideUcispr } from '@/emc/ucispr';
import { parseFrequency } from '@/components/charts/parseFrequency';
import { formatBandwidth } from '@/format/frequencies';
import type { UncertaintyView } from '@/schemas/paths';

/** What stands in the fields of an uncertainty budget, and what it comes to while it is typed. */

export interface RowDraft {
  name: string;
  value: string;
  shape: 'normal' | 'rectangular' | 'triangular' | 'U-shaped';
  k: string;
  sensitivity: string;
  degrees: string;
  source: string;
}
export interface RangeDraft {
  from: string;
  to: string;
  rows: RowDraft[];
}
export type DraftPurpose = 'prescan' | 'final';
export interface BudgetDraft {
  prescan: RangeDraft[];
  final: RangeDraft[];
  uncertaintySource: string;
  reason: string;
}

export const EMPTY_ROW: RowDraft = {
  name: '',
  value: '',
  shape: 'normal',
  k: '2',
  sensitivity: '1',
  degrees: '',
  source: '',
};

const PURPOSES = ['prescan', 'final'] as const;

/** The budget a revision has; one range without a value where its figures are only stated. */
export function budgetDraftOf(uncertainty: readonly UncertaintyView[], source: string): BudgetDraft {
  const ranges = (purpose: DraftPurpose) =>
    uncertainty
      .filter((one) => one.purpose === purpose)
      .map(({ startHz, stopHz, budget }): RangeDraft => {
        const rows = budget?.rows.map((row): RowDraft => {
          const { name, valueDb, distribution, sensitivity, degreesOfFreedom, source } = row;
          return {
            name,
            value: String(valueDb),
            shape: distribution.shape,
            k: distribution.shape === 'normal' ? String(distribution.k) : '2',
            sensitivity: String(sensitivity),
            degrees: degreesOfFreedom === null ? '' : String(degreesOfFreedom),
            source,
          };
        });
        return { from: formatBandwidth(startHz), to: formatBandwidth(stopHz), rows: rows ?? [EMPTY_ROW] };
      });
  const filled = (all: RangeDraft[]) => (all.length > 0 ? all : [{ from: '', to: '', rows: [EMPTY_ROW] }]);
  const computed = uncertainty.some(({ budget }) => budget !== null);
  return {
    prescan: filled(ranges('prescan')),
    final: filled(ranges('final')),
    uncertaintySource: computed ? source : '',
    reason: '',
  };
}

/** A figure with a point or a comma; null when it is none. */
function figureOf(text: string): number | null {
  const trimmed = text.trim().replace(',', '.').replace('\u2212', '-');
  return /^-?(\d+\.?\d*|\.\d+)$/.test(trimmed) ? Number(trimmed) : null;
}

export type RowField = 'name' | 'value' | 'k' | 'sensitivity' | 'degrees' | 'source';

/** The contribution a row stands for, or which of its fields keep it from being one. */
export function contributionOf(row: RowDraft): { contribution: Contribution } | { wrong: RowField[] } {
  const valueDb = figureOf(row.value);
  const k = row.shape === 'normal' ? figureOf(row.k) : 1;
  const sensitivity = figureOf(row.sensitivity);
  const degrees = row.degrees.trim() === '' ? null : figureOf(row.degrees);
  const wrong: RowField[] = [];
  if (row.name.trim() === '') wrong.push('name');
  if (valueDb === null || valueDb < 0) wrong.push('value');
  if (k === null || k <= 0) wrong.push('k');
  if (sensitivity === null) wrong.push('sensitivity');
  if (row.degrees.trim() !== '' && (degrees === null || degrees < 1)) wrong.push('degrees');
  if (row.source.trim() === '') wrong.push('source');
  if (wrong.length > 0) return { wrong };
  return {
    contribution: {
      name: row.name,
      valueDb: valueDb!,
      distribution: row.shape === 'normal' ? { shape: row.shape, k: k! } : { shape: row.shape },
      sensitivity: sensitivity!,
      source: row.source,
      degreesOfFreedom: degrees,
    },
  };
}

/** What a range comes to with the rows that can be computed already, each row's part of it beside it. */
export interface LiveRange {
  result: BudgetResult | null;
  /** Per row of the draft; null for one that is not whole yet. A name and a source may still be missing. */
  rows: ({ contributedDb: number; share: number | null } | null)[];
}

export function liveRange({ rows }: RangeDraft): LiveRange {
  const made = rows.map((row) => contributionOf({ ...row, name: row.name || 'unnamed', source: row.source || 'none' }));
  const whole = made.flatMap((one) => ('contribution' in one ? [one.contribution] : []));
  if (whole.length === 0) return { result: null, rows: rows.map(() => null) };
  const result = budgetOf(whole);
  let at = 0;
  return {
    result,
    rows: made.map((one) => {
      if (!('contribution' in one)) return null;
      const { contributedDb, shareOfVariance } = result.rows[at++]!;
      return { contributedDb, share: shareOfVariance };
    }),
  };
}

export interface LiveBudget {
  ranges: Record<DraftPurpose, LiveRange[]>;
  /** Where the prescan claims less than the final; the server refuses it. */
  below: PrescanBelowFinal[];
}

export function liveBudget(draft: BudgetDraft): LiveBudget {
  const ranges = { prescan: draft.prescan.map(liveRange), final: draft.final.map(liveRange) };
  const steps = (purpose: DraftPurpose) =>
    draft[purpose].flatMap(({ from, to }, i) => {
      const [startHz, stopHz] = [parseFrequency(from), parseFrequency(to)];
      const expandedDb = ranges[purpose][i]!.result?.expandedDb;
      if (startHz === null || stopHz === null || stopHz <= startHz || expandedDb === undefined) return [];
      return [{ startHz, stopHz, expandedDb }];
    });
  return { ranges, below: prescanBelowFinal(steps('prescan'), steps('final')) };
}

/** How U of a range stands to Ucispr; empty where the port has none there. */
export function liveUcispr(port: Port, { from, to }: RangeDraft, expandedDb: number): BesideUcispr[] {
  const [startHz, stopHz] = [parseFrequency(from), parseFrequency(to)];
  return startHz === null || stopHz === null ? [] : besideUcispr({ startHz, stopHz, expandedDb }, port);
}

/** The body to send, or the fields that are not whole: `final/0/rows/3/value`, `prescan/1/to`. */
export function budgetBodyOf(draft: BudgetDraft): { body: object } | { wrong: string[] } {
  const wrong: string[] = [];
  const ranges = (purpose: DraftPurpose) =>
    draft[purpose].map(({ from, to, rows }, i) => {
      const [startHz, stopHz] = [parseFrequency(from), parseFrequency(to)];
      if (startHz === null) wrong.push(`${purpose}/${i}/from`);
      if (stopHz === null || (startHz !== null && stopHz <= startHz)) wrong.push(`${purpose}/${i}/to`);
      const contributions = rows.map((row, at) => {
        const made = contributionOf(row);
        if ('wrong' in made) wrong.push(...made.wrong.map((field) => `${purpose}/${i}/rows/${at}/${field}`));
        return 'contribution' in made ? made.contribution : null;
      });
      return { startHz, stopHz, contributions };
    });
  const budget = Object.fromEntries(PURPOSES.map((purpose) => [purpose, ranges(purpose)]));
  if (wrong.length > 0) return { wrong };
  return { body: { budget, uncertaintySource: draft.uncertaintySource, reason: draft.reason } };
}
