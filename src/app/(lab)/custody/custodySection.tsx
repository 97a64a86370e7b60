import type { MarginSection } from '@/components/shell/marginSection';
import { formatDayTime } from '@/format/dates';
import type { CustodyView } from '@/schemas/custody';

/** Where a sample has been, for its column; the newest says where it is. */
export function custodySection(moves: readonly CustodyView[], zone: string): MarginSection {
  return {
    id: 'custody',
    title: 'Custody',
    summary: moves[0]?.place ?? 'nobody has said where it is',
    children:
      moves.length === 0 ? (
        <p className="column-quiet">Its moves are said on the day sheet.</p>
      ) : (
        <ol>
          {moves.map(({ id, place, note, by, at }) => (
            <li key={id}>
              {place}
              {note && `: ${note}`}
              <span className="column-quiet block">
                {by}, {formatDayTime(at, zone)}
              </span>
            </li>
          ))}
        </ol>
      ),
  };
}
