import { FactorSlip } from '@/components/charts/FactorSlip';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import type { WorkingView } from '@/schemas/sweep';
import {
  formatDb,
  formatFigure,
  formatMarginInterval,
  formatUncertainty,
  marginText,
  unitLabel,
} from '@/format/quantities';
import { formatDay } from '@/format/dates';
import { RULE_NAMES } from '@/format/decisionRules';
import { levelUnit } from '@/schemas/common';
import { VERDICT_WORDS } from '@/format/words';

type Term = WorkingView['terms'][number];

/** The column addition behind a figure: each term with its source, a line above the level, a double one above the margin. */
export function Working({ working }: { working: WorkingView }) {
  const { terms, level, levelUnit, limit, limitSource, marginDb, verdict, because } = working;
  const slips = terms.filter((term) => term.applied && term.table !== null);
  return (
    <>
      <dl className="sum" aria-label="Working">
        {terms.map((term, i) => (
          <SumRow key={i} term={term} />
        ))}
        {level !== null && levelUnit !== null ? (
          <Line figure={formatDb(level)} rule="single">
            {unitLabel(levelUnit)} <b>level</b>
          </Line>
        ) : null}
        {limit !== null && levelUnit !== null ? (
          <Line sign="−" figure={formatDb(limit)} source={limitSource}>
            {unitLabel(levelUnit)} limit
          </Line>
        ) : null}
        {marginDb !== null ? (
          <Line figure={marginText(marginDb).figure} rule="double" tone={verdict} source={interval(working)}>
            dB <b>{marginText(marginDb).word}</b>, <VerdictGlyph verdict={verdict} /> {VERDICT_WORDS[verdict]}
          </Line>
        ) : null}
      </dl>
      {because ? <p className="column-quiet">{because}</p> : null}
      {slips.map((term, i) => (
        <div className="mt-[22px]" key={i}>
          <FactorSlip table={term.table!} frequencyHz={working.frequencyHz} factorDb={term.figure} />
        </div>
      ))}
    </>
  );
}

/** What U leaves open, in words and not in signs. */
function interval({ marginDb, uncertaintyDb, decisionRule, addedDb }: WorkingView): string {
  if (uncertaintyDb === null) return 'No uncertainty is stated here, so nothing is concluded.';
  const range = formatMarginInterval(marginDb!, uncertaintyDb);
  const stated = `${formatUncertainty(uncertaintyDb)}: 95 % interval, instrumentation only, ${range}`;
  if (decisionRule === 'guarded-by-u') return stated;
  const adds = addedDb ? `, which adds ${formatDb(addedDb)} dB to the level` : '';
  return `${stated}. Decided by ${RULE_NAMES[decisionRule]}${adds}`;
}

function SumRow({ term }: { term: Term }) {
  const { sign, figure, unit, name, calibration, warning, applied, notAppliedBecause } = term;
  const source = calibration
    ? `${term.source}, calibrated ${formatDay(calibration.on)}, ${calibration.certificate}`
    : term.source;
  const digits =
    unit === 'V' || unit === 'W' || unit === 'mV' || unit === 'mW' ? formatFigure(figure, 6) : formatDb(figure);
  return (
    <Line sign={applied ? sign : ''} figure={digits} away={!applied} source={source} warning={warning}>
      {labelOf(unit)} {name}
      {applied ? null : <span className="block text-ink2">not added: {notAppliedBecause}</span>}
    </Line>
  );
}

interface LineProps {
  sign?: string;
  figure: string;
  rule?: 'single' | 'double';
  /** Not part of the sum. */
  away?: boolean;
  tone?: WorkingView['verdict'];
  source?: string | null;
  warning?: string | null;
  children: React.ReactNode;
}

function Line({ sign = '', figure, rule, away, tone, source, warning, children }: LineProps) {
  const lined = rule ? `sum-${rule}` : '';
  const toned = tone ? `verdict-${tone}` : '';
  return (
    <div className={`sum-row ${lined} ${away ? 'sum-away' : ''}`}>
      <dt className="sum-sign t-figure">{sign}</dt>
      <dt className={`sum-figure t-figure ${toned}`}>{figure}</dt>
      <dd className={toned}>{children}</dd>
      {source || warning ? (
        <dd className="sum-source">
          {source}
          {warning ? (
            <>
              , <b className="text-ochre">{warning}</b>
            </>
          ) : null}
        </dd>
      ) : null}
    </div>
  );
}

function labelOf(unit: string): string {
  const known = levelUnit.safeParse(unit);
  return known.success ? unitLabel(known.data) : unit;
}
