import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import type { MarginKey, MarginSection } from '@/components/shell/marginSection';
import { Button, ButtonLink } from '@/components/ui/Button';
import { formatFileName } from '@/format/fileNames';
import { formatBytes } from '@/format/quantities';
import type { DropEntry } from './dropEntry';
import { FilePreview } from './FilePreview';

interface Props {
  entry: DropEntry;
  place: string | null;
  margin: readonly MarginSection[];
  keys: readonly MarginKey[];
  /** Another sweep of the same file is a run of its own. */
  onAgain: () => void;
}

/** A file of the drop that was kept already. */
export function KeptSheet({ entry, place, margin, keys, onAgain }: Props) {
  const { kept, name, bytes, file } = entry;
  const several = file!.recognition.sweeps.length > 1;
  return (
    <Sheet
      header={
        <SheetHeader
          title={`Kept as ${kept!.number}`}
          identity={
            <>
              <span className="t-id">{formatFileName(name)}</span>
              <span>{formatBytes(bytes)}</span>
              {place && <span>{place}</span>}
            </>
          }
          finding={{ verdict: 'under', children: 'The file is kept as it was sent, and its run is evaluated.' }}
          actions={
            <>
              {several && <Button onClick={onAgain}>Keep another sweep of it</Button>}
              <ButtonLink kind="primary" href={`/sweeps/${kept!.id}`}>
                Open {kept!.number}
              </ButtonLink>
            </>
          }
        />
      }
      margin={margin}
      keys={keys}
    >
      <div className="mt-2 max-w-[640px]">
        <FilePreview recognition={file!.recognition} />
      </div>
    </Sheet>
  );
}
