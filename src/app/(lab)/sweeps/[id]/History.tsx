import { formatDayTime } from '@/format/dates';

export interface HistoryEntry {
  at: string;
  by: string | null;
  action: string;
}

export function History({ entries, zone }: { entries: HistoryEntry[]; zone: string }) {
  if (entries.length === 0) return <p className="column-quiet">No change is recorded.</p>;
  return (
    <ol>
      {entries.map((entry, i) => (
        <li key={i}>
          {entry.action}
          <span className="column-quiet block">
            {entry.by ?? 'command line'}, {formatDayTime(entry.at, zone)}
          </span>
        </li>
      ))}
    </ol>
  );
}
