'use client';

import { useSheet } from '@/components/shell/sheetState';
import { ComputedFigure } from '@/components/ui/Figure';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { writeQuantity } from '@/format/calculated';
import type { Calculator } from './useCalculator';

/** Every figure of the pane, each opening its working, or why there is none. */
export function AnswerTable({ calculator }: { calculator: Calculator }) {
  const { outcome, pane, shown, show } = calculator;
  const sheet = useSheet();
  return (
    <Table caption={`Figures, ${pane.title.toLowerCase()}`} className="calc-answers">
      <TableHead>
        <HeadCell>Figure</HeadCell>
        <HeadCell figure>Value</HeadCell>
      </TableHead>
      <tbody>
        {outcome.answers.map((answer) => {
          const open = answer.id === shown?.id;
          return (
            <Row key={answer.id} chosen={open}>
              <KeyCell>{answer.name}</KeyCell>
              {answer.because === null ? (
                <Cell figure>
                  <ComputedFigure
                    value={writeQuantity(answer.working.result).figure}
                    unit={writeQuantity(answer.working.result).unit || undefined}
                    quantity={answer.name}
                    open={open}
                    onOpen={(fromKeyboard) => {
                      show(answer.id);
                      // a phone's drawer stays where it is while fields are typed in; a figure asked for draws it out
                      sheet.open('working', { focus: fromKeyboard && sheet.layout !== 'column' });
                    }}
                  />
                </Cell>
              ) : (
                <Cell quiet className="calc-because">
                  {answer.because}
                </Cell>
              )}
            </Row>
          );
        })}
      </tbody>
    </Table>
  );
}
