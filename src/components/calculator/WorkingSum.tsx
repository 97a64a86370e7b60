import { writeQuantity } from '@/format/calculated';
import { ABSENT } from '@/format/quantities';
import type { Term, Working } from './pane';

/** The sum or formula behind a figure: what went in, each term with its source, a line above what it makes. */
export function WorkingSum({ working }: { working: Working }) {
  const { formula, given, terms, result, resultName, source } = working;
  return (
    <dl className="sum calc-sum" aria-label="Working">
      {given.map((term, at) => (
        <Line key={`given ${at}`} term={term} />
      ))}
      {formula !== null && <Formula text={formula} />}
      {terms.map((term, at) => (
        <Line key={at} term={term} lined={at === 0 && given.length > 0} />
      ))}
      <Line term={{ sign: '', quantity: result, name: resultName, source }} rule />
    </dl>
  );
}

function Line({ term, rule, lined }: { term: Term; rule?: boolean; lined?: boolean }) {
  const { sign, quantity, name, source } = term;
  const written = quantity === null ? null : writeQuantity(quantity);
  return (
    <div className={`sum-row ${rule ? 'sum-single' : ''} ${lined ? 'calc-begin' : ''}`}>
      <dt className="sum-sign t-figure">{sign}</dt>
      <dt className="sum-figure t-figure">{written?.figure ?? ABSENT}</dt>
      <dd>
        {written?.unit ? `${written.unit} ` : ''}
        {rule ? <b>{name}</b> : name}
      </dd>
      {source && <dd className="sum-source">{source}</dd>}
    </div>
  );
}

function Formula({ text }: { text: string }) {
  return (
    <div className="sum-row">
      <dt className="sr-only">formula</dt>
      <dd className="calc-formula">{text}</dd>
    </div>
  );
}
