import type { LimitSetView } from '@/schemas/bench';
import type { SweepFileView } from '@/schemas/sweepFile';
import { rangeOf } from './draft';
import type { Draft } from './draftTypes';

/** What a chart of the file shows, and of a broken file the range that was not read. */
export interface FileSpan {
  firstHz: number;
  lastHz: number;
  notRead: { fromHz: number; toHz: number } | null;
}

/**
 * A broken file's chart reaches to where its sweep was meant to end: the declared stop (or start, where it falls), else
 * the end of the limit lines it was in.
 */
export function spanOf(file: SweepFileView, draft: Draft, limitSet: LimitSetView | undefined): FileSpan {
  const { firstHz, lastHz } = rangeOf(draft, file);
  const { partial, settings } = file.recognition;
  const whole = { firstHz: Math.min(firstHz, lastHz), lastHz: Math.max(firstHz, lastHz) };
  if (!partial || !(whole.firstHz > 0)) return { ...whole, notRead: null };
  const edges = (limitSet?.lines ?? []).map(({ segments }) => [
    Math.min(...segments.map(({ startHz }) => startHz)),
    Math.max(...segments.map(({ stopHz }) => stopHz)),
  ]);
  if (lastHz < firstHz) {
    const below = edges.map(([low]) => low!).filter((hz) => hz < lastHz);
    const meant = settings.startHz ?? Math.max(...below);
    if (!(meant > 0 && meant < lastHz)) return { ...whole, notRead: null };
    return { firstHz: meant, lastHz: firstHz, notRead: { fromHz: meant, toHz: lastHz } };
  }
  const above = edges.map(([, high]) => high!).filter((hz) => hz > lastHz);
  const meant = partial.declaredStopHz ?? Math.min(...above);
  if (!(meant > lastHz && Number.isFinite(meant))) return { ...whole, notRead: null };
  return { firstHz, lastHz: meant, notRead: { fromHz: lastHz, toHz: meant } };
}
