import type { Verdict } from '@/schemas/common';
import { countInWords, capitalised, MAINS_LINE_WORDS, PORT_WORDS } from '@/format/words';
import { formatFrequency } from '@/format/frequencies';
import type { RetestItem, RetestView } from '@/schemas/retest';

export type Status = RetestItem['status'];
export type Reason = RetestItem['reason'];

export const STATUS_WORDS: Record<Status, string> = {
  waiting: 'waiting',
  scheduled: 'scheduled',
  measured: 'measured',
  cleared: 'cleared',
  withdrawn: 'withdrawn',
};

export const REASON_WORDS: Record<Reason, string> = {
  over: 'over',
  'needs-final': 'needs a final',
  'repeat-prescan': 'repeat the prescan',
};

/** What the glyph of a row says: what is asked while it is open, what was found once it is measured. */
export function verdictOf({ kind, status, reason, verdict }: RetestItem): Verdict {
  if (status === 'cleared') return 'under';
  if (kind === 'repeat-prescan') return 'not-covered';
  if (status === 'withdrawn') return 'not-covered';
  if (status === 'measured' && verdict) return verdict;
  return reason === 'over' ? 'over' : 'needs-final';
}

export function verdictWord(item: RetestItem): string {
  if (item.status === 'measured' && item.verdict === 'inconclusive') return 'inconclusive';
  if (item.status === 'measured' && item.verdict === 'under') return 'under';
  return REASON_WORDS[item.reason];
}

const POSITION_WORDS: Record<string, string> = { horizontal: 'horizontal', vertical: 'vertical', ...MAINS_LINE_WORDS };

/** `enclosure, horizontal`; `AC mains, line L`. */
export function placeWords({ port, position }: Pick<RetestItem, 'port' | 'position'>): string {
  return position === null ? PORT_WORDS[port] : `${PORT_WORDS[port]}, ${POSITION_WORDS[position]}`;
}

/** Where it is still to be measured, when that is not simply where it read worst. */
export function stillIn({ waitsAt, position, kind }: RetestItem): string | null {
  if (kind === 'repeat-prescan') return null;
  const others = waitsAt.filter((one) => one !== null);
  if (others.length === 0 || (others.length === 1 && others[0] === position)) return null;
  return others.map((one) => POSITION_WORDS[one]).join(' and ');
}

/** `144.018 MHz`, or what stands in its place. */
export function whereWords(item: RetestItem): string {
  if (item.kind === 'repeat-prescan') return `the prescan of ${placeWords(item)}`;
  if (item.kind === 'floor') return `the floor from ${formatFrequency(item.fromHz!)} to ${formatFrequency(item.toHz!)}`;
  return formatFrequency(item.frequencyHz!);
}

/** `waits`, `3 wait`: a verb after a count. */
const verb = (count: number, one: string, many: string) => `${countInWords(count)} ${count === 1 ? one : many}`;

/** The sentence the queue opens with, over the rows that are shown. */
export function retestsFinding(items: readonly RetestItem[], all: boolean): { verdict: Verdict; children: string } {
  const with_ = (status: Status) => items.filter((item) => item.status === status);
  const waiting = with_('waiting');
  const because = (reason: Reason) => waiting.filter((item) => item.reason === reason).length;
  const [over, finals, repeats] = [because('over'), because('needs-final'), because('repeat-prescan')];
  const asked = [
    over > 0 && verb(over, 'is over', 'are over'),
    finals > 0 && verb(finals, 'needs a final', 'need a final'),
    repeats > 0 && verb(repeats, 'prescan is to be repeated', 'prescans are to be repeated'),
  ].filter((text) => text !== false);
  const [scheduled, measured] = [with_('scheduled').length, with_('measured').length];
  const rest = [
    scheduled > 0 && `${verb(scheduled, 'is', 'are')} scheduled`,
    measured > 0 && `${verb(measured, 'was', 'were')} measured and not settled`,
  ].filter((text) => text !== false);
  const verdict: Verdict =
    over > 0 ? 'over' : waiting.length > 0 ? 'needs-final' : measured + scheduled > 0 ? 'inconclusive' : 'under';
  const of = all ? '' : `Of these ${countInWords(items.length)}: `;
  const sentences = [
    asked.length > 0
      ? `${asked.join(', ')}`
      : items.length > 0 && rest.length > 0
        ? 'nothing waits'
        : 'nothing is open here',
    ...(rest.length > 0 ? [rest.join(', ')] : []),
  ];
  const [first, ...others] = sentences;
  return {
    verdict,
    children: [`${of}${of ? first : capitalised(first!)}.`, ...others.map((text) => `${capitalised(text)}.`)].join(' '),
  };
}

/** One line of a history: `Measured`, `Margin moved`. */
export function changeWords({ action }: RetestView['changes'][number]): string {
  return { ...CHANGE_WORDS }[action];
}
const CHANGE_WORDS: Record<RetestView['changes'][number]['action'], string> = {
  opened: 'Opened',
  updated: 'Read again',
  scheduled: 'Scheduled',
  measured: 'Measured',
  cleared: 'Cleared',
  withdrawn: 'Withdrawn',
  reopened: 'Reopened',
};
