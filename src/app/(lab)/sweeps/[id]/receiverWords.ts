import type { ReceiverCheckView, ReceiverFindingView } from '@/schemas/receiver';
import { formatBandwidth, formatFrequency, formatFrequencyRange } from '@/format/frequencies';
import { formatDb, formatLevel, formatTrimmed } from '@/format/quantities';
import { capitalised, countInWords, DETECTOR_WORDS, LINE_WORDS } from '@/format/words';

type Trace = ReceiverCheckView['traces'][number];
type What = ReceiverFindingView['what'];

/** `0.06 ms`, `500 ms`, `1.5 s`. */
export function timeText(seconds: number): string {
  return seconds >= 1 ? `${formatTrimmed(seconds, 2)} s` : `${formatTrimmed(seconds * 1e3, seconds < 1e-3 ? 4 : 2)} ms`;
}

/** What is out of order, for the line the part folds to. */
const OUT_OF_ORDER: Record<What, string> = {
  bandwidth: 'RBW not as asked',
  step: 'step too wide',
  'video-bandwidth': 'VBW too narrow',
  dwell: 'dwell too short',
  'scan-time': 'scan too short',
  detector: 'detector reads low',
  'noise-floor': 'noise floor too near',
  overload: 'input overloaded',
};

function bandsText(bands: readonly string[]): string {
  return bands.length > 1 ? `bands ${bands.slice(0, -1).join(', ')} and ${bands.at(-1)}` : `band ${bands[0]}`;
}

/** `6 in order`, `6 in order, 3 not stated`, or what is not in order first. */
export function receiverSummary({ counts, traces }: ReceiverCheckView): string {
  const wrong = traces
    .flatMap(({ parts, whole }) => [
      ...parts.flatMap(({ band, findings }) => findings.map((finding) => ({ band, finding }))),
      ...whole.map((finding) => ({ band: null, finding })),
    ])
    .filter(({ finding }) => finding.outcome === 'fails');
  const [first] = wrong;
  if (first) {
    const { what } = first.finding;
    const bands = [...new Set(wrong.filter(({ finding }) => finding.what === what).flatMap(({ band }) => band ?? []))];
    const others = new Set(wrong.map(({ finding }) => finding.what)).size - 1;
    return `${OUT_OF_ORDER[what]}${bands.length > 0 ? `, ${bandsText(bands)}` : ''}${others > 0 ? `, ${others} more` : ''}`;
  }
  return `${counts.ok} in order${counts.unknown > 0 ? `, ${counts.unknown} not stated` : ''}`;
}

/** One finding as a sentence or two, with its figures. */
export function receiverSentence(finding: ReceiverFindingView): string {
  if (finding.what === 'overload') return overloadText(finding.figures);
  if (finding.what === 'noise-floor') return floorText(finding);
  if (finding.outcome === 'unknown') return finding.because ?? 'Not stated.';
  const ok = finding.outcome === 'ok';
  switch (finding.what) {
    case 'bandwidth': {
      const { rbwHz, at6DbHz, askedHz } = finding.figures;
      const wide = at6DbHz !== null && at6DbHz !== rbwHz ? ` at 3 dB is ${formatBandwidth(at6DbHz)} at 6 dB` : '';
      const asked = formatBandwidth(askedHz!);
      return `RBW ${formatBandwidth(rbwHz!)}${wide}${ok ? `, as asked (${asked})` : `; ${asked} is asked`}.`;
    }
    case 'step': {
      const { stepHz, greatestStepHz, readsLowDb } = finding.figures;
      const half = `half the RBW (${formatBandwidth(greatestStepHz!)})`;
      const step = `Step ${formatBandwidth(stepHz!)} is ${ok ? 'at most' : 'wider than'} ${half}.`;
      return `${step} A narrow peak may read up to ${formatDb(readsLowDb!)} dB low.`;
    }
    case 'video-bandwidth': {
      const { vbwHz, leastHz } = finding.figures;
      if (vbwHz === null) return 'The video filter is off, as the file says.';
      const least = `three times the RBW (${formatBandwidth(leastHz!)})`;
      return `VBW ${formatBandwidth(vbwHz)} is ${ok ? `at least ${least}` : `below ${least}; a peak may read low`}.`;
    }
    case 'dwell': {
      const { dwellS, leastS } = finding.figures;
      const short = `shorter than ${timeText(leastS!)}; what is not there all the time may be missed`;
      return `Dwell ${timeText(dwellS!)} is ${ok ? `at least ${timeText(leastS!)}` : short}.`;
    }
    case 'scan-time': {
      const { scanTimeS, leastS } = finding.figures;
      return `The scan took ${timeText(scanTimeS!)} here; at least ${timeText(leastS!)} is asked.`;
    }
    case 'detector': {
      const { detector, asked, relation } = finding.figures;
      const read = capitalised(DETECTOR_WORDS[detector]);
      const limit = LINE_WORDS[asked];
      if (relation === 'same') return `${read}, as the ${limit} asks.`;
      if (relation === 'at-or-above')
        return `${read} reads at or above what the ${limit} asks for, so it can show under.`;
      if (relation === 'at-or-below')
        return `${read} reads at or below what the ${limit} asks for, so it cannot show under.`;
      return `${read} shows nothing against the ${limit}.`;
    }
  }
}

function floorText({ outcome, because, lineName, figures }: ReceiverFindingView & { what: 'noise-floor' }): string {
  const { askedDb, leastDistanceDb, leastAtHz, tooHigh, notKnown } = figures;
  const nearest =
    leastDistanceDb === null
      ? ''
      : leastDistanceDb < 0
        ? `${formatDb(-leastDistanceDb)} dB above it at ${formatFrequency(leastAtHz!)}`
        : `${formatDb(leastDistanceDb)} dB below it at ${formatFrequency(leastAtHz!)}`;
  if (outcome === 'fails') {
    const where = listed(tooHigh);
    return `Noise floor less than ${askedDb} dB below ${lineName} at ${where}; nearest ${nearest}.`;
  }
  if (outcome === 'unknown') {
    const where = notKnown.length > 0 ? ` at ${listed(notKnown)}` : '';
    return `Noise floor against ${lineName}${where} not known. ${because ?? ''}`.trim();
  }
  return `Noise floor at least ${askedDb} dB below ${lineName}; nearest ${nearest}.`;
}

const SHOWN_RANGES = 4;

function listed(ranges: readonly { fromHz: number; toHz: number }[]): string {
  const shown = ranges.slice(0, SHOWN_RANGES).map(({ fromHz, toHz }) => formatFrequencyRange(fromHz, toHz));
  const rest = ranges.length - shown.length;
  return shown.join(', ') + (rest > 0 ? ` and ${countInWords(rest)} more` : '');
}

function overloadText({ highestDbuv }: { highestDbuv: number | null }): string {
  const read = highestDbuv === null ? '' : ` The highest reading at the input is ${formatLevel(highestDbuv, 'dBuV')}.`;
  return `Overload is not stated.${read}`;
}

export interface PartGroup {
  /** `bands C and D, 30–1000 MHz` */
  heading: string;
  findings: ReceiverFindingView[];
}

/** Neighbouring bands about which the same is to be said are said together. */
export function partGroups(parts: Trace['parts']): PartGroup[] {
  const groups: { bands: string[]; fromHz: number; toHz: number; said: string; findings: ReceiverFindingView[] }[] = [];
  for (const { band, fromHz, toHz, findings } of parts) {
    const said = findings.map((finding) => `${finding.outcome} ${receiverSentence(finding)}`).join('\n');
    const last = groups.at(-1);
    if (last?.said === said && band !== null && last.bands.length > 0) {
      last.bands.push(band);
      last.toHz = toHz;
    } else groups.push({ bands: band === null ? [] : [band], fromHz, toHz, said, findings });
  }
  return groups.map(({ bands, fromHz, toHz, findings }) => {
    const range = formatFrequencyRange(fromHz, toHz);
    return { heading: bands.length === 0 ? range : `${bandsText(bands)}, ${range}`, findings };
  });
}

/** Documents and clauses the checks come from, each once. */
export function receiverSources({ traces }: ReceiverCheckView): string[] {
  const all = traces.flatMap(({ parts, whole }) => [...parts.flatMap(({ findings }) => findings), ...whole]);
  return [...new Set(all.map(({ source }) => source))];
}
