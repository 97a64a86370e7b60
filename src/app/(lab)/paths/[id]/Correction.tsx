'use client';

import { useState } from 'react';
import { CorrectionChart } from '@/components/charts/CorrectionChart';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { ComputedFigure } from '@/components/ui/Figure';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Switch } from '@/components/ui/Switch';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDb, formatTrimmed } from '@/format/quantities';
import { quantityUnit } from '@/format/revisions';
import { capitalised } from '@/format/words';
import type { CorrectionView, PathRecord } from '@/schemas/paths';
import type { OpenFigure } from './openFigure';
import { reachWords } from './pathWords';

interface Props {
  path: PathRecord;
  askedHz: number | null;
  open: OpenFigure | null;
  onOpen: (figure: OpenFigure, fromKeyboard: boolean) => void;
}

/** What the path adds to a reading over frequency: as a chart, in figures, and what each item gives to it. */
export function Correction({ path, askedHz, open, onOpen }: Props) {
  const { corrections, items, unit } = path;
  const [chosen, setChosen] = useState(0);
  const correction = corrections[chosen];
  if (!correction || correction.terms.length === 0) {
    return (
      <section aria-label="Total correction">
        <SectionHeading className="mt-6">Total correction</SectionHeading>
        <p className="t-text mt-2">No item of this path adds anything; a reading is its level.</p>
      </section>
    );
  }
  const other = corrections.find((one) => one !== correction) ?? null;
  return (
    <section aria-label="Total correction">
      <SectionHeading
        className="mt-6"
        remark={
          corrections.length > 1 ? (
            <Switch
              legend="Polarisation"
              choices={corrections.map(({ polarisation }, i) => ({ value: String(i), word: polarisation ?? 'both' }))}
              value={String(chosen)}
              onChange={(value) => setChosen(Number(value))}
            />
          ) : (
            'added to a reading in dBµV'
          )
        }
      >
        Total correction
      </SectionHeading>
      <div className="mt-3">
        <CorrectionChart correction={correction} other={other} items={items} unit={unit} />
      </div>
      {corrections.map((one) => (
        <p key={one.polarisation ?? 'both'} className="t-text mt-2">
          {capitalised(reachWords(one))}
        </p>
      ))}
      <p className="t-text">
        Between two rows of a table it is straight in dB over log f; beyond its rows it has no value.
      </p>
      <Figures correction={correction} at={chosen} path={path} open={open} onOpen={onOpen} askedHz={askedHz} />
      <form method="get" className="mt-3 flex flex-wrap items-end gap-3" aria-label="Correction at a frequency">
        <input type="hidden" name="revision" value={path.revision} />
        <Field
          label="Also at"
          name="mhz"
          unit="MHz"
          inputMode="decimal"
          autoComplete="off"
          className="w-40"
          defaultValue={askedHz === null ? '' : formatTrimmed(askedHz / 1e6, 6)}
        />
        <Button type="submit">State the correction</Button>
      </form>
    </section>
  );
}

interface FiguresProps extends Props {
  correction: CorrectionView;
  /** Its place in the record. */
  at: number;
}

function Figures({ path, correction, at, open, onOpen, askedHz }: FiguresProps) {
  const { unit } = path;
  const tables = path.items.flatMap((item) => item.tables);
  const unitFor = (id: string) => quantityUnit(tables.find((table) => table.id === id)?.quantity ?? null);
  const named = correction.polarisation ? `, ${correction.polarisation}` : '';
  return (
    <Table caption={`Correction at round frequencies${named}`} className="mt-3">
      <TableHead>
        <HeadCell figure unit="MHz">
          Frequency
        </HeadCell>
        {correction.terms.map(({ identifier, sign, tableId }) => (
          <HeadCell key={identifier} figure unit={unitFor(tableId)}>
            {sign === '−' ? `less ${identifier}` : identifier}
          </HeadCell>
        ))}
        <HeadCell figure unit={unit}>
          Total
        </HeadCell>
      </TableHead>
      <tbody>
        {correction.at.map(({ frequencyHz, totalDb, shares }) => {
          const shown = open?.kind === 'total' && open.correction === at && open.frequencyHz === frequencyHz;
          const mhz = formatTrimmed(frequencyHz / 1e6, 6);
          return (
            <Row key={frequencyHz} chosen={shown}>
              <KeyCell className="tbl-figure t-figure">
                {frequencyHz === askedHz ? <strong>{mhz}</strong> : <span className="font-normal">{mhz}</span>}
              </KeyCell>
              {shares.map(({ shareDb, inPath }, i) => (
                <Cell key={correction.terms[i]!.identifier} figure quiet={shareDb === null}>
                  {shareDb === null
                    ? inPath
                      ? 'no factor'
                      : 'not in it'
                    : formatDb(correction.terms[i]!.sign === '−' ? -shareDb : shareDb)}
                </Cell>
              ))}
              <Cell figure quiet={totalDb === null}>
                {totalDb === null ? (
                  'none'
                ) : (
                  <ComputedFigure
                    value={formatDb(totalDb)}
                    saidUnit={unit}
                    quantity={`correction at ${mhz} MHz${named}`}
                    open={shown}
                    strong
                    onOpen={(fromKeyboard) => onOpen({ kind: 'total', correction: at, frequencyHz }, fromKeyboard)}
                  />
                )}
              </Cell>
            </Row>
          );
        })}
      </tbody>
    </Table>
  );
}
