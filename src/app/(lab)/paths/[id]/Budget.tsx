import { ComputedFigure } from '@/components/ui/Figure';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { distributionWords, shareWords } from '@/format/budgets';
import { formatFrequencyRange } from '@/format/frequencies';
import { formatFigure, formatTrimmed } from '@/format/quantities';
import type { UncertaintyView } from '@/schemas/paths';
import type { OpenFigure } from './openFigure';

interface Props {
  view: UncertaintyView;
  /** Its place in the record. */
  of: number;
  open: OpenFigure | null;
  onOpen: (figure: OpenFigure, fromKeyboard: boolean) => void;
}

const WIDE = 'max-pad:hidden';

/** The contributions of one range, largest first, and what they come to. */
export function Budget({ view, of, open, onOpen }: Props) {
  const { purpose, startHz, stopHz, budget } = view;
  const range = formatFrequencyRange(startHz, stopHz);
  const name = `Budget for a ${purpose}, ${range}`;
  const rows = budget!.rows.map((row, at) => ({ row, at })).sort((a, b) => b.row.contributedDb - a.row.contributedDb);
  return (
    <details className="mt-4" open={purpose === 'final'}>
      <summary className="t-text cursor-pointer font-semibold max-pad:min-h-11 max-pad:py-3">
        {name}: u {formatFigure(budget!.combinedDb, 2)} dB, k {formatTrimmed(budget!.coverageFactor, 2)}, U{' '}
        {formatFigure(budget!.expandedDb, 2)} dB
      </summary>
      <Table caption={name} className="mt-1">
        <TableHead>
          <HeadCell>Contribution</HeadCell>
          <HeadCell figure unit="dB">
            Value
          </HeadCell>
          <HeadCell>Distribution</HeadCell>
          <HeadCell figure>Divisor</HeadCell>
          <HeadCell figure className={WIDE}>
            Sensitivity
          </HeadCell>
          <HeadCell figure unit="dB">
            u
          </HeadCell>
          <HeadCell figure>Share</HeadCell>
          <HeadCell className={WIDE}>Source</HeadCell>
        </TableHead>
        <tbody>
          {rows.map(({ row, at }) => {
            const shown = open?.kind === 'contribution' && open.of === of && open.row === at;
            return (
              <Row key={at} chosen={shown}>
                <KeyCell className="min-w-40">{row.name}</KeyCell>
                <Cell figure>{formatTrimmed(row.valueDb, 3)}</Cell>
                <Cell className="whitespace-nowrap">{distributionWords(row.distribution)}</Cell>
                <Cell figure>{formatFigure(row.divisor, 3)}</Cell>
                <Cell figure className={WIDE}>
                  {formatTrimmed(row.sensitivity, 3)}
                </Cell>
                <Cell figure>
                  <ComputedFigure
                    value={formatFigure(row.contributedDb, 3)}
                    saidUnit="dB"
                    quantity={`${row.name}, standard uncertainty`}
                    open={shown}
                    onOpen={(fromKeyboard) => onOpen({ kind: 'contribution', of, row: at }, fromKeyboard)}
                  />
                </Cell>
                <Cell figure>{shareWords(row.shareOfVariance)}</Cell>
                <Cell quiet className={WIDE}>
                  {row.source}
                </Cell>
              </Row>
            );
          })}
        </tbody>
      </Table>
    </details>
  );
}
