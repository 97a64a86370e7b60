'use client';

import { useKey } from '@/components/shell/keys';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { Message } from '@/components/ui/Message';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { HeadCell, Table, TableHead } from '@/components/ui/Table';
import { formatFileName } from '@/format/fileNames';
import { stillToSay } from './draft';
import { DropRow } from './DropRow';
import { files, isReady, standingOf, type DropEntry, type Standing } from './dropEntry';
import type { UploadLists } from './uploadLists';
import type { Drop } from './useDrop';

interface Props {
  drop: Drop;
  notes: readonly string[];
  lists: UploadLists;
  onKeep: (keys: readonly string[]) => Promise<void>;
  onChoose: () => void;
}

/** Every file of the drop in one row: how far it is, what is still to be said, what it was kept as. */
export function DropList({ drop, notes, lists, onKeep, onChoose }: Props) {
  const { shown } = drop;
  const last = drop.lastBut();
  const of = (...standings: Standing[]) => shown.filter((entry) => standings.includes(standingOf(entry)));
  const ready = shown.filter(isReady);
  const keeping = of('keeping');
  const unsaid = of('unsaid');
  const others = unsaid.filter((entry) => entry.key !== last?.key);
  useKey('ArrowDown', () => step(1), { says: 'next file' });
  useKey('ArrowUp', () => step(-1), { says: 'file before' });

  const counts: [Standing[], string][] = [
    [['kept'], 'kept'],
    [['ready'], 'ready'],
    [['unsaid'], 'with something still to say'],
    [['refused', 'not-taken'], 'refused'],
    [['not-kept'], 'not kept'],
    [['waits', 'sending', 'recognising'], 'on the way'],
    [['keeping'], 'being kept'],
  ];
  const said = counts.flatMap(([standings, words]) => {
    const { length } = of(...standings);
    return length > 0 ? [`${length} ${words}`] : [];
  });
  const bad = of('refused', 'not-taken', 'not-kept').length > 0;
  const coming = of('waits', 'sending', 'recognising').length;
  return (
    <Sheet
      header={
        <SheetHeader
          title={shown.length === 1 ? 'One file' : `${shown.length} files`}
          finding={{
            verdict: bad ? 'over' : unsaid.length > 0 ? 'inconclusive' : coming > 0 ? 'not-covered' : 'under',
            children: `${capitalised(said.join(', '))}. ${ready.length > 0 || unsaid.length > 0 ? 'Nothing is kept before you say so.' : ''}`,
          }}
          actions={
            <>
              <Button keyName="U" onClick={onChoose}>
                Add files
              </Button>
              {ready.length > 0 || keeping.length > 0 ? (
                <Button
                  kind="primary"
                  keyName="K"
                  busy={keeping.length > 0}
                  onClick={() => void onKeep(ready.map(({ key }) => key))}
                >
                  Keep {files(ready.length + keeping.length)}
                </Button>
              ) : unsaid.length > 0 ? (
                <Button kind="unavailable">Waits for {firstUnsaid(unsaid)}</Button>
              ) : null}
            </>
          }
        />
      }
    >
      {notes.map((note) => (
        <Message key={note} tone="inconclusive" lead={note} live="polite" className="mt-3" />
      ))}
      <p className="sr-only" role="status">
        {coming > 0 ? `${files(coming)} on the way` : `${files(shown.length)} here`}
      </p>
      <div className="mt-4">
        <Table caption="Files of this drop" twoLine className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
          <TableHead>
            <HeadCell>File</HeadCell>
            <HeadCell className="max-pad:hidden">Read as</HeadCell>
            <HeadCell className="max-pad:hidden">Line or pol.</HeadCell>
            <HeadCell className="max-pad:hidden">Sample</HeadCell>
            <HeadCell className="max-pad:hidden">Stands</HeadCell>
            <HeadCell>
              <span className="sr-only">Act</span>
            </HeadCell>
          </TableHead>
          <tbody>
            {shown.map((entry) => (
              <DropRow
                key={entry.key}
                entry={entry}
                lists={lists}
                onOpen={() => drop.openEntry(entry)}
                onDiscard={() => drop.discard(entry.key)}
                onAgain={drop.canSendAgain(entry.key) ? () => drop.sendAgain(entry.key) : null}
              />
            ))}
          </tbody>
        </Table>
      </div>
      {last && others.length > 0 && (
        <section className="mt-6 max-w-[640px]">
          <SectionHeading>Same as last</SectionHeading>
          <p className="t-text mt-2 text-ink2">
            Takes what was said of <span className="t-id">{formatFileName(last.name, 40)}</span>: path, limit set,
            operating mode and trial, and units, detector and RBW where a file states none. Polarisation, conductor and
            height stay as each name proposes them.
          </p>
          <div className="mt-3">
            <Button
              onClick={() =>
                drop.sayAs(
                  last,
                  others.map(({ key }) => key),
                )
              }
            >
              Same as last for {files(others.length)}
            </Button>
          </div>
        </section>
      )}
      {!last && unsaid.length > 1 && (
        <p className="t-text mt-4 text-ink2">Open one and say what it is; the others can then take the same.</p>
      )}
    </Sheet>
  );
}

const capitalised = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

function firstUnsaid([entry]: readonly DropEntry[]): string {
  return stillToSay(entry!.draft!, entry!.file!)[0]!;
}

/** Arrow keys go from row to row; Enter opens the one they are on. */
function step(by: number): boolean | void {
  const rows = [...document.querySelectorAll<HTMLElement>('[data-drop-row]')];
  const at = rows.findIndex((row) => row === document.activeElement);
  if (at < 0 && document.activeElement !== document.body) return false;
  rows[at < 0 ? (by > 0 ? 0 : rows.length - 1) : Math.min(rows.length - 1, Math.max(0, at + by))]?.focus();
}
