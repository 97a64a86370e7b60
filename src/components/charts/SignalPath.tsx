import type { SweepView } from '@/schemas/sweep';
import { formatDue, formatShortDay } from '@/format/dates';
import { formatDistance } from '@/format/quantities';
import { FORCED } from './chartText';

type PathItem = NonNullable<SweepView['path']>['items'][number];

interface Props {
  items: readonly PathItem[];
  /** The EUT at the head of the path. */
  sample: { name: string; where?: string };
  /** Over the first gap; null where the path is conducted. */
  distanceM: number | null;
  /** The lab's own day, `2026-11-17`. */
  today: string;
}

/** A line with one square per item at its calibration position: in date under it, due soon across, lapsed above. */
export function SignalPath({ items, sample, distanceM, today }: Props) {
  return (
    <ol
      className={`grid auto-cols-[minmax(5.75rem,6.75rem)] grid-flow-col overflow-x-auto pt-1 ${FORCED}`}
      aria-label="Signal path"
    >
      <li>
        <svg width="100%" height="30" className="block overflow-visible" aria-hidden="true">
          <line x1="0" x2="100%" y1="18" y2="18" className="stroke-ink" strokeWidth="1.5" />
          <circle cx="13" cy="18" r="6" className="fill-sheet stroke-ink" strokeWidth="1.5" />
          {distanceM === null ? null : (
            <text x="50%" dx="13" y="10" textAnchor="middle" fontSize="12.5" className="t-figure fill-ink2">
              {formatDistance(distanceM)}
            </text>
          )}
        </svg>
        <ItemText id={sample.name} text={sample.where ?? 'EUT'} colour="text-ink2" />
        {distanceM === null ? null : <span className="sr-only">{formatDistance(distanceM)} to the antenna</span>}
      </li>
      {items.map((item, i) => (
        <li key={`${item.identifier}-${i}`} title={item.description}>
          <svg width="100%" height="30" className="block overflow-visible" aria-hidden="true">
            <line x1="0" x2="100%" y1="18" y2="18" className="stroke-ink" strokeWidth="1.5" />
            <DueSquare due={item.due} />
          </svg>
          <ItemText id={item.identifier} text={dueText(item, today)} colour={DUE_COLOUR[item.due]} />
        </li>
      ))}
    </ol>
  );
}

const DUE_COLOUR: Record<PathItem['due'], string> = {
  'in-date': 'text-ink2',
  'due-soon': 'text-ochre',
  lapsed: 'text-madder',
  'not-calibrated': 'text-ink3',
};

function DueSquare({ due }: { due: PathItem['due'] }) {
  if (due === 'in-date') return <rect x="8" y="22" width="9" height="9" className="fill-kelp" />;
  if (due === 'due-soon')
    return <rect x="8.75" y="13.75" width="8.5" height="8.5" className="fill-sheet stroke-ochre" strokeWidth="1.7" />;
  if (due === 'lapsed') return <rect x="8" y="5" width="9" height="9" className="fill-madder" />;
  return (
    <rect
      x="8.75"
      y="13.75"
      width="8.5"
      height="8.5"
      className="fill-sheet stroke-ink3"
      strokeWidth="1.2"
      strokeDasharray="2 2"
    />
  );
}

function dueText(item: PathItem, today: string): string {
  if (item.due === 'not-calibrated' || item.dueOn === null) return 'not calibrated';
  if (item.due === 'in-date') return `due ${formatShortDay(item.dueOn)}`;
  return formatDue(item.dueOn, today);
}

function ItemText({ id, text, colour }: { id: string; text: string; colour: string }) {
  return (
    <div className="pr-2 pl-1.5">
      <span className="t-id block overflow-hidden text-ellipsis text-[13px] leading-5">{id}</span>
      <span className={`block text-[12.5px] leading-[17px] ${colour}`}>{text}</span>
    </div>
  );
}
