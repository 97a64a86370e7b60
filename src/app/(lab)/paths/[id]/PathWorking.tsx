import { FactorSlip } from '@/components/charts/FactorSlip';
import { distributionWords, divisorWords, INSTRUMENTATION_ONLY, shareWords } from '@/format/budgets';
import { formatDay } from '@/format/dates';
import { formatDb, formatFigure, formatTrimmed } from '@/format/quantities';
import { quantityUnit } from '@/format/revisions';
import type { PathRecord } from '@/schemas/paths';
import type { OpenFigure } from './openFigure';
import { SumLine } from './SumLine';

/** How the open figure came about, line by line. */
export function PathWorking({ path, open }: { path: PathRecord; open: OpenFigure | null }) {
  if (open === null)
    return <p className="column-quiet">A figure with a dotted line under it shows here how it came about.</p>;
  if (open.kind === 'total') return <TotalWorking path={path} open={open} />;
  const view = path.uncertainty[open.of];
  if (!view?.budget) return null;
  return open.kind === 'expanded' ? <Expanded budget={view.budget} /> : <One budget={view.budget} at={open.row} />;
}

function TotalWorking({ path, open }: { path: PathRecord; open: Extract<OpenFigure, { kind: 'total' }> }) {
  const { terms, at } = path.corrections[open.correction]!;
  const found = at.find(({ frequencyHz }) => frequencyHz === open.frequencyHz);
  if (!found || found.totalDb === null) return null;
  const tables = path.items.flatMap((item) => item.tables.map((table) => ({ item, table })));
  const lines = terms.map((term, i) => {
    const { item, table } = tables.find((one) => one.table.id === term.tableId)!;
    return { ...term, ...found.shares[i]!, item, table };
  });
  const added = lines.filter(({ shareDb }) => shareDb !== null);
  const left = lines.filter(({ inPath }) => !inPath);
  return (
    <>
      <dl className="sum" aria-label="Working">
        {added.map(({ identifier, name, sign, shareDb, item, table }, i) => (
          <SumLine
            key={identifier}
            sign={sign === '+' && i === 0 ? '' : sign}
            figure={formatDb(sign === '−' ? -shareDb! : shareDb!)}
            source={`${identifier}: ${table.name}, revision ${table.revision}, ${table.source}${item.calibratedOn ? `, calibrated ${formatDay(item.calibratedOn)}` : ''}`}
          >
            {quantityUnit(table.quantity)} {name}
          </SumLine>
        ))}
        <SumLine figure={formatDb(found.totalDb)} rule="single" source="what is added less what is taken away">
          {path.unit} <b>total correction</b>
        </SumLine>
      </dl>
      {left.length > 0 && (
        <p className="column-quiet">Not in the path here: {left.map(({ identifier }) => identifier).join(', ')}.</p>
      )}
      {added.map(({ identifier, rows, shareDb, sign, table }) =>
        rows === null ? null : (
          <div className="mt-[22px]" key={identifier}>
            <FactorSlip
              table={{ name: table.name, ...rows }}
              frequencyHz={found.frequencyHz}
              factorDb={sign === '−' ? -shareDb! : shareDb!}
            />
          </div>
        ),
      )}
    </>
  );
}

type Computed = NonNullable<PathRecord['uncertainty'][number]['budget']>;

function One({ budget, at }: { budget: Computed; at: number }) {
  const row = budget.rows[at];
  if (!row) return null;
  return (
    <dl className="sum" aria-label="Working">
      <SumLine figure={formatFigure(row.valueDb, 3)} source={row.source}>
        dB {row.name}
      </SumLine>
      <SumLine sign="÷" figure={formatFigure(row.divisor, 3)} source={distributionWords(row.distribution)}>
        {divisorWords(row.distribution)}
      </SumLine>
      <SumLine sign="×" figure={formatTrimmed(Math.abs(row.sensitivity), 3)}>
        sensitivity
      </SumLine>
      <SumLine
        figure={formatFigure(row.contributedDb, 3)}
        rule="double"
        source={`${shareWords(row.shareOfVariance)} of the variance of ${formatFigure(budget.combinedDb, 2)} dB`}
      >
        dB <b>standard uncertainty</b>
      </SumLine>
    </dl>
  );
}

function Expanded({ budget }: { budget: Computed }) {
  const { rows, combinedDb, coverageFactor, effectiveDegreesOfFreedom, expandedDb } = budget;
  const largest = [...rows].sort((a, b) => b.contributedDb - a.contributedDb);
  return (
    <>
      <dl className="sum" aria-label="Working">
        {largest.map((row, i) => (
          <SumLine key={i} figure={formatFigure(row.contributedDb, 3)}>
            dB {row.name}
            <span className="column-quiet">
              {' '}
              {formatTrimmed(row.valueDb, 3)} ÷ {formatFigure(row.divisor, 3)}
              {row.sensitivity !== 1 && ` × ${formatTrimmed(Math.abs(row.sensitivity), 3)}`}
            </span>
          </SumLine>
        ))}
        <SumLine
          figure={formatFigure(combinedDb, 3)}
          rule="single"
          source="root of the sum of their squares (GUM 5.1.2)"
        >
          dB <b>combined u</b>
        </SumLine>
        <SumLine
          sign="×"
          figure={formatFigure(coverageFactor, 2)}
          source={
            effectiveDegreesOfFreedom === null
              ? 'k for 95.45 %, nothing limits the degrees of freedom'
              : `t factor for 95.45 % at ${formatTrimmed(effectiveDegreesOfFreedom, 1)} effective degrees of freedom (GUM G.4.1)`
          }
        >
          coverage factor k
        </SumLine>
        <SumLine figure={formatFigure(expandedDb, 2)} rule="double">
          dB <b>expanded U</b>
        </SumLine>
      </dl>
      <p className="column-quiet">{INSTRUMENTATION_ONLY}</p>
    </>
  );
}
