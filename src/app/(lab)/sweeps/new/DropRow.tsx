import Link from 'next/link';
import { Button } from '@/components/ui/Button';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, KeyCell, Row } from '@/components/ui/Table';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { formatFileName } from '@/format/fileNames';
import { formatFrequencyRange } from '@/format/frequencies';
import { ABSENT, formatBytes, formatCount } from '@/format/quantities';
import { MAINS_LINE_WORDS, POLARISATION_MARKS, PURPOSE_WORDS } from '@/format/words';
import { rangeOf } from './draft';
import { glyphOf, standingOf, standingWords, type DropEntry } from './dropEntry';
import type { UploadLists } from './uploadLists';

interface Props {
  entry: DropEntry;
  lists: UploadLists;
  onOpen: () => void;
  onDiscard: () => void;
  /** Sends a file again that was not taken; null where it is not at hand any more. */
  onAgain: (() => void) | null;
}

/** One file of a drop. On a phone its second line says what the columns say. */
export function DropRow({ entry, lists, onOpen, onDiscard, onAgain }: Props) {
  const { file, kept, share } = entry;
  const standing = standingOf(entry);
  const name = formatFileName(entry.name, 44);
  const sample = sampleOf(entry, lists);
  const stands = (
    <span className="flex gap-1.5">
      <span className="shrink-0">
        <VerdictGlyph verdict={glyphOf(entry)} />
      </span>
      <span className="min-w-0 [overflow-wrap:anywhere]">
        {kept ? <Link href={`/sweeps/${kept.id}`}>{standingWords(entry)}</Link> : standingWords(entry)}
        {share !== null && (
          <progress
            className="mt-1 block h-1.5 w-40 max-w-full accent-pen"
            max={1}
            value={share < 1 ? share : undefined}
            aria-label={`${share < 1 ? 'Sending' : 'Recognising'} ${name}`}
          />
        )}
      </span>
    </span>
  );
  return (
    <Row>
      <KeyCell className="max-pad:w-full max-pad:py-2">
        {file ? (
          <button
            type="button"
            data-drop-row
            className="t-id block max-w-[300px] truncate text-left font-semibold text-pen max-pad:min-h-11 max-pad:max-w-[230px]"
            onClick={onOpen}
          >
            {name}
          </button>
        ) : (
          <span className="t-id block max-w-[300px] truncate max-pad:max-w-[230px]">{name}</span>
        )}
        <span className="t-detail block font-normal">
          {formatBytes(entry.bytes)}
          <span className="pad:hidden">
            {sample && `, ${sample.code} ${sample.label}`}
            {positionOf(entry) !== ABSENT && `, ${positionOf(entry)}`}
          </span>
        </span>
        <span className="t-text mt-0.5 block font-normal whitespace-normal pad:hidden">{stands}</span>
      </KeyCell>
      <Cell className="whitespace-nowrap max-pad:hidden" quiet>
        {file && file.recognition.frequency.points > 0 ? readAs(entry) : ABSENT}
      </Cell>
      <Cell className="whitespace-nowrap max-pad:hidden">{positionOf(entry)}</Cell>
      <Cell className="whitespace-nowrap max-pad:hidden">
        {sample ? (
          <>
            <span className="mr-1.5">{sample.code}</span>
            <StateTag label={sample.label} />
            <span className="t-detail block">{PURPOSE_WORDS[entry.draft!.purpose]}</span>
          </>
        ) : (
          ABSENT
        )}
      </Cell>
      <Cell className="min-w-[180px] max-pad:hidden">{stands}</Cell>
      <Cell className="text-right whitespace-nowrap max-pad:pr-0!">
        {standing === 'not-taken' && onAgain && (
          <Button kind="quiet" size="table" onClick={onAgain}>
            Send again
          </Button>
        )}
        {standing !== 'kept' && standing !== 'keeping' && (
          <Button kind="quiet" size="table" aria-label={`${file ? 'Discard' : 'Stop'} ${name}`} onClick={onDiscard}>
            {file || standing === 'not-taken' ? 'Discard' : 'Stop'}
          </Button>
        )}
      </Cell>
    </Row>
  );
}

function readAs({ file, draft }: DropEntry) {
  const { firstHz, lastHz } = rangeOf(draft!, file!);
  const { points } = file!.recognition.frequency;
  return (
    <>
      {formatCount(points)} points
      <span className="t-figure block">
        {formatFrequencyRange(Math.min(firstHz, lastHz), Math.max(firstHz, lastHz))}
      </span>
    </>
  );
}

function positionOf({ draft }: DropEntry): string {
  if (!draft) return ABSENT;
  if (draft.port !== 'enclosure') return draft.line === '' ? ABSENT : MAINS_LINE_WORDS[draft.line];
  const height = draft.heightM === '' ? '' : `${draft.heightM} m`;
  const polarisation = draft.polarisation === '' ? '' : POLARISATION_MARKS[draft.polarisation];
  return [polarisation, height].filter(Boolean).join(', ') || ABSENT;
}

function sampleOf({ draft }: DropEntry, { samples }: UploadLists): { code: string; label: string } | null {
  const sample = samples.find(({ states }) => states.some(({ id }) => id === draft?.stateId));
  const state = sample?.states.find(({ id }) => id === draft?.stateId);
  return sample && state ? { code: sample.product.code, label: state.label } : null;
}
