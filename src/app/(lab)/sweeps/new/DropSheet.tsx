import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';

/** Where files are dropped or chosen. The whole sheet takes a drop. */
export function DropSheet({ notes, onChoose }: { notes: readonly string[]; onChoose: () => void }) {
  return (
    <Sheet
      header={
        <SheetHeader
          title="Upload sweep files"
          finding={{ verdict: 'not-covered', children: 'Nothing is read yet. The original is kept as it was sent.' }}
        />
      }
    >
      {notes.map((note) => (
        <Message key={note} tone="inconclusive" lead={note} live="polite" className="mt-3" />
      ))}
      <div className="mt-4 flex min-h-[236px] max-w-[640px] flex-col items-start border border-dashed border-edge bg-margin px-5 py-5">
        <svg viewBox="0 0 264 56" className="w-full max-w-[420px]" aria-hidden>
          <path d="M0 8h264" className="stroke-ink" strokeWidth="2" />
          <path d="M132 8v26" className="stroke-pen" strokeWidth="1.4" />
          <rect x="128" y="32" width="8" height="8" className="fill-pen" />
          <path
            d="M0 49c8-3 10 2 18 0s10-3 18 0 12 2 20-1 12 3 20 1 12-3 20 0 12 1 20-1 12 3 20 1 12-3 20 0 12 2 20-1 12 2 20 0 12-2 20 1 12-1 20 0 10 2 28-1"
            fill="none"
            className="stroke-ink3"
          />
        </svg>
        <h2 className="t-section mt-4">Drop sweep files anywhere on this sheet</h2>
        <p className="t-text mt-1 text-ink2">
          Text or CSV from any receiver or analyser, several at once, up to 100 MB each. What a file does not say is
          asked before anything is kept.
        </p>
        <div className="mt-4">
          <Button kind="primary" keyName="U" onClick={onChoose}>
            Choose files
          </Button>
        </div>
      </div>
    </Sheet>
  );
}
