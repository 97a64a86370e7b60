'use client';

import { EMPTY_ROW, liveUcispr, type LiveRange, type RangeDraft, type RowDraft } from '@/components/forms/budgetDraft';
import { Button } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { shareWords, ucisprWords } from '@/format/budgets';
import { formatFigure } from '@/format/quantities';
import { capitalised } from '@/format/words';
import type { Port } from '@/schemas/common';

interface Props {
  /** `final/0`: its fields are marked by it. */
  name: string;
  purpose: string;
  port: Port;
  range: RangeDraft;
  live: LiveRange;
  wrong: readonly string[];
  onChange: (range: RangeDraft) => void;
  /** null for the only one. */
  onRemove: (() => void) | null;
}

/** One range: its ends, its contributions, and what they come to. */
export function BudgetRange({ name, purpose, port, range, live, wrong, onChange, onRemove }: Props) {
  const { result } = live;
  const setRow = (at: number, more: Partial<RowDraft>) =>
    onChange({ ...range, rows: range.rows.map((row, i) => (i === at ? { ...row, ...more } : row)) });
  const end = (field: 'from' | 'to', label: string) => ({
    label,
    name: `${name}/${field}`,
    value: range[field],
    autoComplete: 'off',
    figure: true,
    placeholder: '30 MHz',
    ...(wrong.includes(`${name}/${field}`) && { error: `${label} is a frequency, such as 30 MHz.` }),
    onChange: (event: { target: { value: string } }) => onChange({ ...range, [field]: event.target.value }),
  });
  const ucispr = result ? liveUcispr(port, range, result.expandedDb) : [];
  return (
    <div className="budget-range">
      <div className="flex flex-wrap items-end gap-3">
        <Field {...end('from', 'From')} className="w-36" />
        <Field {...end('to', 'To')} className="w-36" />
        {onRemove && (
          <Button size="table" kind="quiet" onClick={onRemove}>
            Remove this range
          </Button>
        )}
      </div>
      <ol className="budget-rows" aria-label={`Contributions for a ${purpose}, ${range.from} to ${range.to}`}>
        {range.rows.map((row, at) => (
          <BudgetRow
            key={at}
            at={at}
            row={row}
            live={live.rows[at] ?? null}
            wrong={wrong
              .filter((field) => field.startsWith(`${name}/rows/${at}/`))
              .map((field) => field.split('/').at(-1)!)}
            onChange={(more) => setRow(at, more)}
            onRemove={
              range.rows.length > 1 ? () => onChange({ ...range, rows: range.rows.filter((_, i) => i !== at) }) : null
            }
          />
        ))}
      </ol>
      <div className="mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <Button size="table" onClick={() => onChange({ ...range, rows: [...range.rows, EMPTY_ROW] })}>
          Add a contribution
        </Button>
        <output className="t-text" aria-live="polite">
          {result ? (
            <>
              u <span className="t-figure">{formatFigure(result.combinedDb, 3)} dB</span>, k{' '}
              <span className="t-figure">{formatFigure(result.coverageFactor, 2)}</span>,{' '}
              <strong>
                U <span className="t-figure">{formatFigure(result.expandedDb, 2)} dB</span>
              </strong>
            </>
          ) : (
            'No contribution has a value yet.'
          )}
        </output>
      </div>
      {result &&
        ucispr.map((one) => (
          <p key={one.fromHz} className="t-detail mt-1">
            {capitalised(ucisprWords(result.expandedDb, one))}
          </p>
        ))}
    </div>
  );
}

interface RowProps {
  at: number;
  row: RowDraft;
  live: LiveRange['rows'][number];
  wrong: readonly string[];
  onChange: (more: Partial<RowDraft>) => void;
  onRemove: (() => void) | null;
}

const SHAPES: Readonly<Record<string, Pick<RowDraft, 'shape' | 'k'>>> = {
  k2: { shape: 'normal', k: '2' },
  k1: { shape: 'normal', k: '1' },
  k: { shape: 'normal', k: '' },
  rectangular: { shape: 'rectangular', k: '2' },
  triangular: { shape: 'triangular', k: '2' },
  'U-shaped': { shape: 'U-shaped', k: '2' },
};
const shapeOf = ({ shape, k }: RowDraft) => (shape !== 'normal' ? shape : k === '2' ? 'k2' : k === '1' ? 'k1' : 'k');

function BudgetRow({ at, row, live, wrong, onChange, onRemove }: RowProps) {
  const which = `contribution ${at + 1}`;
  const text = (field: 'name' | 'value' | 'k' | 'sensitivity' | 'degrees' | 'source', label: string) => ({
    label: (
      <>
        {label}
        <span className="sr-only"> of {which}</span>
      </>
    ),
    value: row[field],
    autoComplete: 'off',
    ...(wrong.includes(field) && {
      error: field === 'name' || field === 'source' ? `${label} is needed.` : `${label} is a figure, such as 1.5.`,
    }),
    onChange: (event: { target: { value: string } }) => onChange({ [field]: event.target.value }),
  });
  const figure = { inputMode: 'decimal' as const, figure: true };
  const shape = shapeOf(row);
  return (
    <li className="budget-row">
      <Field {...text('name', 'Contribution')} maxLength={120} className="budget-name" />
      <Field {...text('value', 'Value')} {...figure} unit="dB" />
      <div className="budget-shape">
        <SelectField
          label={
            <>
              Distribution<span className="sr-only"> of {which}</span>
            </>
          }
          value={shape}
          onChange={(event) => onChange(SHAPES[event.target.value]!)}
        >
          <option value="k2">normal, k = 2</option>
          <option value="k1">normal, k = 1</option>
          <option value="k">normal, other k</option>
          <option value="rectangular">rectangular</option>
          <option value="triangular">triangular</option>
          <option value="U-shaped">U-shaped</option>
        </SelectField>
        {shape === 'k' && <Field {...text('k', 'k')} {...figure} />}
      </div>
      <Field {...text('sensitivity', 'Sensitivity')} {...figure} />
      <Field {...text('degrees', 'n less 1')} {...figure} placeholder="no limit" />
      <Field {...text('source', 'Source')} maxLength={300} className="budget-source" />
      <p className="budget-live t-detail">
        {live ? (
          <>
            <span className="t-figure">{formatFigure(live.contributedDb, 3)} dB</span>
            {live.share !== null && <span>, {shareWords(live.share)}</span>}
          </>
        ) : (
          'no value yet'
        )}
      </p>
      {onRemove && (
        <Button
          size="table"
          kind="quiet"
          className="budget-remove"
          onClick={onRemove}
          aria-label={`Remove ${row.name || which}`}
        >
          Remove
        </Button>
      )}
    </li>
  );
}
