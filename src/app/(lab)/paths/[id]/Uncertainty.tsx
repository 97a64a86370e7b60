import { ComputedFigure } from '@/components/ui/Figure';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { INSTRUMENTATION_ONLY, ucisprWords } from '@/format/budgets';
import { formatFrequencyRange } from '@/format/frequencies';
import { ABSENT, formatDb, formatFigure } from '@/format/quantities';
import { capitalised, PURPOSE_WORDS } from '@/format/words';
import type { PathRecord } from '@/schemas/paths';
import { Budget } from './Budget';
import type { OpenFigure } from './openFigure';

interface Props {
  path: PathRecord;
  open: OpenFigure | null;
  onOpen: (figure: OpenFigure, fromKeyboard: boolean) => void;
}

/** Expanded uncertainty over frequency for a prescan and a final, where it comes from, and how it stands to Ucispr. */
export function Uncertainty({ path, open, onOpen }: Props) {
  const { uncertainty, uncertaintySource, withoutUncertainty } = path;
  const stated = uncertainty.filter(({ budget }) => budget === null);
  return (
    <section aria-label="Uncertainty" id="uncertainty">
      <SectionHeading className="mt-6" remark="expanded, 95 %, instrumentation only">
        Uncertainty
      </SectionHeading>
      {uncertainty.length === 0 && (
        <EmptyLine lead="No uncertainty is stated for this path.">Nothing measured through it concludes.</EmptyLine>
      )}
      {uncertainty.length > 0 && (
        <Table caption="Expanded uncertainty over frequency">
          <TableHead>
            <HeadCell>For a</HeadCell>
            <HeadCell>Range</HeadCell>
            <HeadCell figure unit="dB">
              U
            </HeadCell>
            <HeadCell figure unit="dB">
              Ucispr
            </HeadCell>
            <HeadCell>From</HeadCell>
          </TableHead>
          <tbody>
            {uncertainty.map(({ purpose, startHz, stopHz, expandedDb, budget, ucispr }, of) => {
              const shown = open?.kind === 'expanded' && open.of === of;
              const range = formatFrequencyRange(startHz, stopHz);
              return (
                <Row key={`${purpose} ${startHz}`} chosen={shown}>
                  <KeyCell>{PURPOSE_WORDS[purpose]}</KeyCell>
                  <Cell className="t-figure">{range}</Cell>
                  <Cell figure strong>
                    {budget ? (
                      <ComputedFigure
                        value={formatFigure(expandedDb, 2)}
                        saidUnit="dB"
                        quantity={`expanded uncertainty for a ${purpose}, ${range}`}
                        open={shown}
                        strong
                        onOpen={(fromKeyboard) => onOpen({ kind: 'expanded', of }, fromKeyboard)}
                      />
                    ) : (
                      formatFigure(expandedDb, 2)
                    )}
                  </Cell>
                  <Cell figure quiet>
                    {ucispr.length > 0 ? ucispr.map(({ ucisprDb }) => formatDb(ucisprDb)).join(', ') : ABSENT}
                  </Cell>
                  <Cell quiet>{budget ? `budget of ${budget.rows.length} contributions` : 'stated, no budget'}</Cell>
                </Row>
              );
            })}
          </tbody>
        </Table>
      )}
      {stated.length > 0 && (
        <p className="t-text mt-2">
          These figures are stated, not computed: {uncertaintySource}. What they are made of cannot be shown before a
          budget is entered.
        </p>
      )}
      {uncertainty.length > stated.length && <p className="t-text mt-2">{capitalised(uncertaintySource)}.</p>}
      {uncertainty.flatMap(({ purpose, expandedDb, ucispr }) =>
        ucispr.map((one) => (
          <p key={`${purpose} ${one.fromHz}`} className="t-text mt-1">
            {capitalised(purpose)}: {ucisprWords(expandedDb, one)}
          </p>
        )),
      )}
      {withoutUncertainty.map(({ purpose, fromHz, toHz }) => (
        <p key={`${purpose} ${fromHz}`} className="t-text mt-1">
          No uncertainty for a {purpose} over {formatFrequencyRange(fromHz, toHz)}: levels there conclude nothing.
        </p>
      ))}
      <p className="t-text mt-1">{INSTRUMENTATION_ONLY}</p>
      {uncertainty.map(
        (view, of) => view.budget && <Budget key={of} view={view} of={of} open={open} onOpen={onOpen} />,
      )}
    </section>
  );
}
