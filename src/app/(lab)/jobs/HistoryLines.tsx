import { changeText, type FieldChange } from '@/format/changes';
import { formatDayTime } from '@/format/dates';

export interface HistoryLine {
  at: string;
  by: string | null;
  action: string;
  changes: readonly FieldChange[];
}

/** What happened, newest first; people do it, or a command of the lab. */
export function HistoryLines({ entries, zone }: { entries: readonly HistoryLine[]; zone: string }) {
  if (entries.length === 0) return <p className="column-quiet">No change is recorded.</p>;
  return (
    <ol>
      {entries.map((entry, at) => (
        <li key={at}>
          {entry.action}
          {entry.changes.map((change) => (
            <span key={change.name} className="block [overflow-wrap:anywhere]">
              {changeText(change)}
            </span>
          ))}
          <span className="column-quiet block">
            {entry.by ?? 'a command'}, {formatDayTime(entry.at, zone)}
          </span>
        </li>
      ))}
    </ol>
  );
}

/** The margin section that holds them: folded to one line with the last change. */
export function historySection(entries: readonly HistoryLine[], zone: string, open = false) {
  const [last] = entries;
  const count = entries.length === 1 ? '1 change' : `${entries.length} changes`;
  return {
    id: 'history',
    title: 'History',
    summary: last ? `${count}, last ${formatDayTime(last.at, zone)}` : 'no change',
    open,
    children: <HistoryLines entries={entries} zone={zone} />,
  };
}
