'use client';

import { useKey } from '@/components/shell/keys';
import type { MarginSection } from '@/components/shell/marginSection';
import { AlsoInDrop } from './AlsoInDrop';
import { standingOf, type DropEntry } from './dropEntry';
import { KeptSheet } from './KeptSheet';
import { RecogniseSheet } from './RecogniseSheet';
import { Recognised } from './Recognised';
import { RefusedSheet } from './RefusedSheet';
import type { UploadLists } from './uploadLists';
import type { Drop } from './useDrop';

interface Props {
  drop: Drop;
  entry: DropEntry;
  lists: UploadLists;
  onKeep: (keys: readonly string[]) => Promise<void>;
  onChoose: () => void;
}

/** One file of the drop: kept, refused, or recognised and still to be answered. */
export function OpenFile({ drop, entry, lists, onKeep, onChoose }: Props) {
  const { shown } = drop;
  const file = entry.file!;
  const draft = entry.draft!;
  const at = shown.indexOf(entry);
  const step = (by: number) => {
    const held = shown.filter((one) => one.file);
    const next = held[(held.indexOf(entry) + by + held.length) % held.length];
    if (next && next !== entry) drop.openEntry(next);
  };
  useKey(']', () => step(1), { when: shown.length > 1, says: 'next file' });
  useKey('[', () => step(-1), { when: shown.length > 1, says: 'file before' });

  const margin: MarginSection[] = [
    { id: 'recognised', title: 'What was recognised', children: <Recognised recognition={file.recognition} /> },
    ...(shown.length > 1
      ? [
          {
            id: 'drop',
            title: 'Also in this drop',
            count: shown.length - 1,
            children: <AlsoInDrop entries={shown} open={entry} onOpen={drop.openEntry} onAll={drop.closeEntry} />,
          },
        ]
      : []),
  ];
  const common = {
    entry,
    margin,
    place: shown.length > 1 ? `file ${at + 1} of ${shown.length}` : null,
    keys: shown.length > 1 ? [{ keys: ['[', ']'], does: 'other files' }] : [],
    onDiscard: () => drop.discard(entry.key),
  };
  if (entry.kept) return <KeptSheet {...common} onAgain={() => drop.again(entry.key)} />;
  if (standingOf(entry) === 'refused')
    return (
      <RefusedSheet
        {...common}
        others={shown.filter((one) => one !== entry)}
        lists={lists}
        onPartial={() => drop.keepPartial(entry.key)}
        onChoose={onChoose}
      />
    );
  const last = drop.lastBut(entry.key);
  return (
    <RecogniseSheet
      {...common}
      draft={draft}
      lists={lists}
      last={last}
      onLast={() => last && drop.sayAs(last, [entry.key])}
      onDraft={(change) => drop.say(entry.key, change)}
      onSweep={(index) => void drop.chooseSweep(entry.key, index)}
      onKeep={() => onKeep([entry.key])}
    />
  );
}
