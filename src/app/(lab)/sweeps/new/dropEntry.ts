import type { Problem } from '@/components/forms/problem';
import type { VerdictGlyphProps } from '@/components/ui/VerdictGlyph';
import { formatBytes, formatCount } from '@/format/quantities';
import type { SweepFileView } from '@/schemas/sweepFile';
import { stillToSay } from './draft';
import type { Draft } from './draftTypes';

/** One file of a drop, on its way in or held by the lab. */
export interface DropEntry {
  /** Stays the same from the drop until it is kept. */
  key: string;
  name: string;
  bytes: number;
  /** While it is sent: how much of it has left this device, 0 to 1; 1 while it is being recognised. */
  share: number | null;
  /** Why it waits or was not taken. */
  problem: Problem | null;
  file: SweepFileView | null;
  draft: Draft | null;
  /** When the person last said something of it, in milliseconds; 0 when nothing was said yet. */
  touched: number;
  keeping: boolean;
  kept: { id: string; number: string } | null;
}

export const MAX_BYTES = 100 * 1024 * 1024;

export const tooLarge = (bytes: number): Problem => ({
  type: 'about:blank',
  title: `It has ${formatBytes(bytes)}; a sweep file takes at most 100 MB.`,
  status: 413,
  detail: 'Export a shorter range or fewer traces.',
  errors: [],
  refusal: null,
});

let count = 0;

export function entryFor(name: string, bytes: number): DropEntry {
  const key = `drop-${Date.now().toString(36)}-${++count}-${Math.random().toString(36).slice(2, 10)}`;
  const empty = { share: null, problem: null, file: null, draft: null, touched: 0, keeping: false, kept: null };
  return { key, name, bytes, ...empty };
}

export type Standing =
  'waits' | 'sending' | 'recognising' | 'not-taken' | 'refused' | 'unsaid' | 'ready' | 'keeping' | 'not-kept' | 'kept';

export function standingOf(entry: DropEntry): Standing {
  if (entry.kept) return 'kept';
  if (entry.keeping) return 'keeping';
  if (!entry.file || !entry.draft) {
    if (entry.share !== null) return entry.share < 1 ? 'sending' : 'recognising';
    return entry.problem && !entry.problem.waiting ? 'not-taken' : 'waits';
  }
  if (entry.file.recognition.kind === 'refused' && !entry.draft.keepPartial) return 'refused';
  if (stillToSay(entry.draft, entry.file).length > 0) return 'unsaid';
  return entry.problem ? 'not-kept' : 'ready';
}

/** It can be kept as it stands; one that failed can be tried again. */
export const isReady = (entry: DropEntry) => ['ready', 'not-kept'].includes(standingOf(entry));

/** Leaving now would leave something of it undone. What was refused stays in the file it came from. */
export const isUnkept = (entry: DropEntry) => !['kept', 'refused', 'not-taken'].includes(standingOf(entry));

type Verdict = VerdictGlyphProps['verdict'];

const GLYPHS: Record<Standing, Verdict> = {
  waits: 'not-covered',
  sending: 'not-covered',
  recognising: 'not-covered',
  'not-taken': 'over',
  refused: 'over',
  unsaid: 'inconclusive',
  ready: 'under',
  keeping: 'not-covered',
  'not-kept': 'over',
  kept: 'under',
};

/** Above the line: act; across it: a person has to say something; under it: settled. */
export const glyphOf = (entry: DropEntry): Verdict => GLYPHS[standingOf(entry)];

/** Where a file stands, in words; a kept one is a link to its run instead. */
export function standingWords(entry: DropEntry): string {
  const { file, draft, problem } = entry;
  switch (standingOf(entry)) {
    case 'waits':
      return problem ? problem.title : 'waits for its turn';
    case 'sending':
      return `${formatBytes(entry.bytes * entry.share!)} of ${formatBytes(entry.bytes)} sent`;
    case 'recognising':
      return 'recognising';
    case 'not-taken':
      return [problem!.title, problem!.detail ?? problem!.errors[0]?.message].filter(Boolean).join(' ');
    case 'refused': {
      const { refusal, partial } = file!.recognition;
      const where = refusal!.line === null ? 'refused' : `refused at line ${formatCount(refusal!.line)}`;
      return partial ? `${where}; ${formatCount(partial.points)} points could be kept` : where;
    }
    case 'unsaid':
      return `still to say: ${stillToSay(draft!, file!).join(', ')}`;
    case 'ready':
      return ['ready', draft!.keepPartial && 'as partial', draft!.trial.trim() && `trial: ${draft!.trial.trim()}`]
        .filter(Boolean)
        .join(', ');
    case 'keeping':
      return 'keeping';
    case 'not-kept':
      return `not kept: ${[problem!.title, problem!.errors[0]?.message ?? problem!.detail].filter(Boolean).join(' ')}`;
    case 'kept':
      return `kept, ${entry.kept!.number}`;
  }
}

/** `Keep 4 files`, `Keep 1 file`. */
export const files = (count: number) => (count === 1 ? '1 file' : `${formatCount(count)} files`);
