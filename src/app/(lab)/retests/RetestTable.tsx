'use client';

import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { dayOf, formatShortDay } from '@/format/dates';
import { formatFrequencyMhz } from '@/format/frequencies';
import { ABSENT, formatDb, marginText, unitLabel } from '@/format/quantities';
import { DETECTOR_MARKS } from '@/format/words';
import type { RetestItem } from '@/schemas/retest';
import { placeWords, STATUS_WORDS, verdictOf, verdictWord } from './retestWords';

interface Props {
  items: readonly RetestItem[];
  zone: string;
  chosenId: string | null;
  onChoose: (id: string, fromKeyboard: boolean) => void;
}

/** Hidden on a phone, where the second line of the first cell says it. */
const WIDE = 'max-pad:hidden';
/** The record in the margin says it again. */
const BROAD = 'max-wide:hidden';

/** The queue as rows, in the order it came: over first, the smallest margin first. */
export function RetestTable({ items, zone, chosenId, onChoose }: Props) {
  return (
    <Table caption="Retests, over first, then by margin" className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
      <TableHead>
        <HeadCell>Retest</HeadCell>
        <HeadCell className={WIDE}>Reason</HeadCell>
        <HeadCell figure unit="MHz">
          Frequency
        </HeadCell>
        <HeadCell className={WIDE}>Sample</HeadCell>
        <HeadCell className={WIDE}>Port</HeadCell>
        <HeadCell className={BROAD}>Limit</HeadCell>
        <HeadCell figure className={BROAD}>
          Level
        </HeadCell>
        <HeadCell figure unit="dB">
          Margin
        </HeadCell>
        <HeadCell className={WIDE}>Since</HeadCell>
        <HeadCell className={WIDE}>Status</HeadCell>
      </TableHead>
      <tbody>
        {items.map((item) => (
          <Row key={item.id} chosen={item.id === chosenId}>
            <KeyCell className="whitespace-nowrap max-pad:py-2">
              <button
                type="button"
                className="t-id min-h-8 font-semibold hover:text-pen max-pad:min-h-11"
                aria-pressed={item.id === chosenId}
                aria-label={`${item.number}, show it`}
                onClick={(event) => onChoose(item.id, event.detail === 0)}
              >
                {item.number}
              </button>
              <span className="block pad:hidden">
                <VerdictWord verdict={verdictOf(item)}>{verdictWord(item)}</VerdictWord>
              </span>
              <span className="t-detail block font-normal whitespace-normal pad:hidden">
                {item.product.code} {item.state.label}, {placeWords(item)}, {statusWords(item)}
              </span>
            </KeyCell>
            <Cell className={`${WIDE} whitespace-nowrap`}>
              <VerdictWord verdict={verdictOf(item)}>{verdictWord(item)}</VerdictWord>
            </Cell>
            <Cell figure className="max-pad:py-3.5">
              <Where item={item} />
            </Cell>
            <Cell className={`${WIDE} whitespace-nowrap`}>
              <span className="font-semibold">{item.product.code}</span>
              <StateTag label={item.state.label} className="mx-2" />
              <span className={`${BROAD} t-id text-ink2`}>{item.sample.code}</span>
            </Cell>
            <Cell className={WIDE} quiet>
              {placeWords(item)}
            </Cell>
            <Cell className={`${BROAD} whitespace-nowrap`} quiet>
              {item.line ? DETECTOR_MARKS[item.line.detector] : ABSENT}
            </Cell>
            <Cell figure className={BROAD}>
              {item.level !== null && item.line ? `${formatDb(item.level)} ${unitLabel(item.line.unit)}` : ABSENT}
            </Cell>
            <Cell figure strong className="max-pad:py-3.5">
              {item.marginDb === null ? ABSENT : <Margin marginDb={item.marginDb} />}
            </Cell>
            <Cell className={`${WIDE} whitespace-nowrap`} quiet>
              {formatShortDay(dayOf(item.since, zone))}
            </Cell>
            <Cell className={`${WIDE} whitespace-nowrap`} quiet={item.status !== 'waiting'}>
              {statusWords(item)}
            </Cell>
          </Row>
        ))}
      </tbody>
    </Table>
  );
}

/** `scheduled 3 Dec` where a day is named. */
export function statusWords({ status, scheduledOn }: RetestItem): string {
  return status === 'scheduled' && scheduledOn ? `for ${formatShortDay(scheduledOn)}` : STATUS_WORDS[status];
}

function Where({ item }: { item: RetestItem }) {
  if (item.kind === 'repeat-prescan') return <span className="text-ink2">whole range</span>;
  if (item.kind === 'peak') return <>{formatFrequencyMhz(item.frequencyHz!)}</>;
  return (
    <>
      {formatFrequencyMhz(item.fromHz!)}–{formatFrequencyMhz(item.toHz!)}
    </>
  );
}

/** The word after the figure has its own width, so that figures stand under one another. */
function Margin({ marginDb }: { marginDb: number }) {
  const { figure, word } = marginText(marginDb);
  return (
    <span className="inline-flex items-baseline justify-end whitespace-nowrap">
      {figure} <span className="ml-1.5 w-[2.9rem] text-left font-normal">{word}</span>
    </span>
  );
}
