'use client';

import type { ReactNode } from 'react';
import type { MarginKey, MarginSection } from '@/components/shell/marginSection';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { Button } from '@/components/ui/Button';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatFileName } from '@/format/fileNames';
import { formatFrequency, formatFrequencyRange } from '@/format/frequencies';
import { formatBytes, formatCount } from '@/format/quantities';
import { BrokenLines } from './BrokenLines';
import { rangeOf } from './draft';
import type { DropEntry } from './dropEntry';
import { FilePreview } from './FilePreview';
import { ReadBefore } from './ReadBefore';
import { spanOf } from './spanOf';
import type { UploadLists } from './uploadLists';

interface Props {
  entry: DropEntry;
  /** The other files of the drop. */
  others: readonly DropEntry[];
  place: string | null;
  lists: UploadLists;
  margin: readonly MarginSection[];
  keys: readonly MarginKey[];
  onPartial: () => void;
  onDiscard: () => void;
  onChoose: () => void;
}

/** A file that cannot be read as it is: the line, what is missing in it, and the ways on. Nothing is kept by itself. */
export function RefusedSheet(props: Props) {
  const { entry, others, place, lists, margin, keys, onPartial, onDiscard, onChoose } = props;
  const file = entry.file!;
  const draft = entry.draft!;
  const { recognition } = file;
  const { refusal, broken, partial } = recognition;
  const limitSet = lists.limitSets.find(({ id }) => id === draft.limitSetId);
  const { notRead } = spanOf(file, draft, limitSet);
  const { lastHz } = rangeOf(draft, file);
  return (
    <Sheet
      header={
        <SheetHeader
          title="This file was not kept"
          identity={
            <>
              <span className="t-id">{formatFileName(file.name)}</span>
              <span>{formatBytes(file.bytes)}</span>
              {place && <span>{place}</span>}
            </>
          }
          finding={{ verdict: 'over', children: findingOf(file.recognition, lastHz) }}
          actions={
            <>
              <Button kind="quiet" onClick={onDiscard}>
                Discard file
              </Button>
              <Button kind="primary" keyName="U" onClick={onChoose}>
                Drop a new copy
              </Button>
            </>
          }
        />
      }
      margin={margin}
      keys={[{ keys: ['U'], does: 'new copy' }, ...keys]}
    >
      <div className="mt-2 grid gap-x-8 gap-y-6 wide:grid-cols-[minmax(0,540px)_minmax(0,1fr)]">
        <div className="min-w-0">
          {broken && refusal!.line !== null ? (
            <BrokenLines broken={broken} wrongLine={refusal!.line} />
          ) : (
            <FilePreview recognition={recognition} wrongLine={refusal!.line} />
          )}
          {partial && <ReadBefore file={file} draft={draft} lists={lists} />}
        </div>
        <div className="min-w-0">
          <SectionHeading>What to do</SectionHeading>
          <ol>
            <Way number={1} lead="Export it again.">
              {againText(entry, others)}
            </Way>
            {partial && (
              <Way number={2} lead="Or keep what was read.">
                The run will be marked partial:{' '}
                {notRead ? (
                  <>
                    <span className="t-figure">{formatFrequencyRange(notRead.fromHz, notRead.toHz)}</span> stays not
                    measured,{' '}
                  </>
                ) : null}
                what is over in it is over, and nothing of it is ever under.
                <span className="mt-2 block">
                  <Button onClick={onPartial}>Keep {formatCount(partial.points)} points as partial</Button>
                </span>
              </Way>
            )}
            <Way number={partial ? 3 : 2} lead={partial ? 'Or discard it.' : 'If the receiver wrote it so,'}>
              {partial
                ? 'Nothing of it is kept then.'
                : 'keep the file and show its first lines to the lab’s manager. Nothing of it is kept here.'}
            </Way>
          </ol>
          <SectionHeading className="mt-6">What stands there</SectionHeading>
          <dl className="t-text mt-2 grid grid-cols-[88px_minmax(0,1fr)] gap-y-1">
            <dt className="text-ink2">Found</dt>
            <dd className="[overflow-wrap:anywhere]">{refusal!.found}</dd>
            <dt className="text-ink2">Expected</dt>
            <dd>{gapped(refusal!.expected)}</dd>
          </dl>
        </div>
      </div>
    </Sheet>
  );
}

function Way({ number, lead, children }: { number: number; lead: string; children: ReactNode }) {
  return (
    <li className="t-text grid grid-cols-[32px_minmax(0,1fr)] border-b border-rule py-3">
      <span className="t-figure text-ink2">{number}</span>
      <div>
        <b className="block">{lead}</b>
        <span className="text-ink2">{children}</span>
      </div>
    </li>
  );
}

/** Line and cause, without the counts and the way on that the sheet shows beside it. */
function findingOf({ refusal, partial, broken }: SweepRecognition, lastHz: number): ReactNode {
  const sentence = refusal!.message
    .replace(/ \d+ (?:points|rows) were read before it.*$/, '')
    .replace(/^Line (\d+)/, (_whole, line: string) => `Line ${formatCount(Number(line))}`);
  if (!partial || !broken?.lines.some(({ text }) => text === null)) return sentence;
  return (
    <>
      {sentence.replace(/\.$/, '')}, after <span className="t-figure">{formatFrequency(lastHz)}</span>.
    </>
  );
}
type SweepRecognition = NonNullable<DropEntry['file']>['recognition'];

/** Counts in a sentence with thin gaps, as everywhere. */
const gapped = (text: string) => text.replace(/\b\d{4,}\b/g, (count) => formatCount(Number(count)));

/** Where other files of the drop have the same shape, they show where this one should have ended. */
function againText({ file }: DropEntry, others: readonly DropEntry[]): ReactNode {
  const { shape, broken, partial } = file!.recognition;
  const alike = others.filter((one) => one.file?.recognition.shape === shape && !one.file?.recognition.refusal);
  const ends = new Set(alike.map((one) => one.file!.recognition.frequency.lastHz));
  const early = broken?.lines.at(-1)?.text === null ? 'It stopped being written early. ' : '';
  if (!partial || alike.length === 0 || ends.size !== 1) {
    return `${early}Let the export finish before the file is copied, as text or CSV with frequency and level.`;
  }
  return (
    <>
      {early}
      {alike.length === 1
        ? 'Another file of this drop in the same layout ends'
        : `${alike.length} others of this drop in the same layout end`}{' '}
      at <span className="t-figure">{formatFrequency([...ends][0]!)}</span>.
    </>
  );
}
