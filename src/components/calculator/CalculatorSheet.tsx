'use client';

import { SheetHeader } from '@/components/shell/SheetHeader';
import { Sheet } from '@/components/shell/Sheet';
import { useKey } from '@/components/shell/keys';
import { Runs } from '@/components/ui/Figure';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatQuantity } from '@/format/calculated';
import { AnswerTable } from './AnswerTable';
import { PaneFields } from './PaneFields';
import { PaneList } from './PaneList';
import { useCalculator } from './useCalculator';
import { WorkingSum } from './WorkingSum';
import './calculator.css';

/** What a bench reaches for daily, computed in the browser from what is typed; nothing is kept but the address. */
export function CalculatorSheet({ query }: { query: string }) {
  const calculator = useCalculator(query);
  const { pane, outcome, shown } = calculator;
  useKey('ArrowDown', () => calculator.step(1), { says: 'next calculation', weak: true });
  useKey('ArrowUp', () => calculator.step(-1), { says: 'calculation before', weak: true });

  return (
    <Sheet
      header={
        <SheetHeader title="Calculator" identity={<span>Nothing typed here is kept; the address holds it.</span>} />
      }
      margin={[
        {
          id: 'working',
          title: 'Working',
          subject: shown?.name.toLowerCase(),
          children: shown ? (
            <WorkingSum working={shown.working} />
          ) : (
            <p className="column-quiet">The sum or formula of a figure stands here once there is one.</p>
          ),
        },
        {
          id: 'holds',
          title: 'Where it holds',
          children: (
            <ul>
              {pane.holds.map((sentence) => (
                <li key={sentence} className="calc-holds">
                  {sentence}
                </li>
              ))}
            </ul>
          ),
        },
      ]}
      marginLine={shown ? `${shown.name} ${formatQuantity(shown.working.result)}` : pane.title}
      keys={[
        { keys: ['ArrowUp', 'ArrowDown'], does: 'calculations' },
        { keys: ['Tab'], does: 'fields' },
        { keys: ['?'], does: 'all keys' },
      ]}
    >
      <div className="calc">
        <PaneList calculator={calculator} />
        <section className="calc-pane" aria-labelledby="calc-title">
          <SectionHeading id="calc-title">{pane.title}</SectionHeading>
          {/* what a pane is for stands where its figures will be said */}
          <p className="finding calc-says" role="status">
            <span>{outcome.says ? <Runs runs={outcome.says} /> : pane.about}</span>
          </p>
          <PaneFields key={pane.id} calculator={calculator} />
          <AnswerTable calculator={calculator} />
          {outcome.cautions.length > 0 && (
            <Message tone="inconclusive" className="mt-3">
              {outcome.cautions.join(' ')}
            </Message>
          )}
          {outcome.notes?.map((note) => (
            <p key={note} className="t-detail mt-2">
              {note}
            </p>
          ))}
          <p className="t-detail mt-4">An aid at the bench, not a record: what counts is on the sheet of a run.</p>
        </section>
      </div>
    </Sheet>
  );
}
