import Link from 'next/link';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatMargin } from '@/format/quantities';
import type { RetestItem } from '@/schemas/retest';
import { addressOf } from './retestQuery';
import { STATUS_WORDS, verdictOf, verdictWord, whereWords } from './retestWords';

/** As many as fit beside the Working; the queue shows the rest. */
const SHOWN = 8;

/** The part of a run's margin with what the run asked for or settled; nothing where it did neither. */
export function retestsSection(retests: { items: readonly RetestItem[]; next: string | null }, sweepId: string) {
  const { items, next } = retests;
  if (items.length === 0) return [];
  const open = items.filter(({ status }) => ['waiting', 'scheduled', 'measured'].includes(status)).length;
  const many = next === null ? String(items.length) : `more than ${items.length}`;
  return [
    {
      id: 'retests',
      title: 'Retests',
      summary: open > 0 ? `${open} of ${many} open` : `${many}, none open`,
      children: (
        <RunRetests items={items.slice(0, SHOWN)} href={addressOf({ status: 'all', run: sweepId })} many={many} />
      ),
    },
  ];
}

/** Finals the run left to measure, and the sheet they are typed in; null when it left none. */
export function finalsToMeasure(retests: { items: readonly RetestItem[]; next: string | null }, sweepId: string) {
  const open = retests.items.filter(
    ({ kind, status }) => kind !== 'repeat-prescan' && (status === 'waiting' || status === 'scheduled'),
  ).length;
  if (open === 0) return null;
  const many = retests.next === null ? (open === 1 ? '1 final' : `${open} finals`) : `over ${open} finals`;
  return { act: `Measure ${many}`, href: `/finals?run=${sweepId}` };
}

function RunRetests({ items, href, many }: { items: readonly RetestItem[]; href: string; many: string }) {
  return (
    <>
      <ul>
        {items.map((item) => (
          <li key={item.id}>
            <VerdictWord verdict={verdictOf(item)}>{verdictWord(item)}</VerdictWord>{' '}
            <span className="t-figure">{whereWords(item)}</span>
            {item.marginDb !== null && <>, {formatMargin(item.marginDb)}</>}
            <span className="column-quiet block">
              <span className="t-id">{item.number}</span>, {STATUS_WORDS[item.status]}: {item.statusReason}
            </span>
          </li>
        ))}
      </ul>
      <Link prefetch={false} href={href} className="text-pen">
        Show {many} in the queue
      </Link>
    </>
  );
}
