import Link from 'next/link';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { formatFileName } from '@/format/fileNames';
import { glyphOf, standingOf, standingWords, type DropEntry } from './dropEntry';

interface Props {
  entries: readonly DropEntry[];
  open: DropEntry;
  onOpen: (entry: DropEntry) => void;
  onAll: () => void;
}

/** The files of the drop beside the open one, each with where it stands. */
export function AlsoInDrop({ entries, open, onOpen, onAll }: Props) {
  return (
    <>
      <ul>
        {entries.map((entry) => (
          <li key={entry.key} className="flex gap-2">
            <span className="shrink-0">
              <VerdictGlyph verdict={glyphOf(entry)} />
            </span>
            <span className="min-w-0 flex-1">
              {entry === open ? (
                <b className="t-id block truncate" aria-current="true">
                  {formatFileName(entry.name, 34)}
                </b>
              ) : entry.file ? (
                <button
                  type="button"
                  className="t-id block max-w-full truncate text-left text-pen max-pad:min-h-11"
                  onClick={() => onOpen(entry)}
                >
                  {formatFileName(entry.name, 34)}
                </button>
              ) : (
                <span className="t-id block truncate">{formatFileName(entry.name, 34)}</span>
              )}
              <span className="column-quiet block [overflow-wrap:anywhere]">
                {entry.kept ? <Link href={`/sweeps/${entry.kept.id}`}>{standingWords(entry)}</Link> : shortly(entry)}
              </span>
            </span>
          </li>
        ))}
      </ul>
      <button type="button" className="text-pen max-pad:min-h-11" onClick={onAll}>
        All {entries.length} files
      </button>
    </>
  );
}

function shortly(entry: DropEntry): string {
  const words = standingWords(entry);
  if (standingOf(entry) !== 'unsaid') return words;
  const [first, ...rest] = words.split(', ');
  return rest.length === 0 ? first! : `${first} and ${rest.length} more`;
}
