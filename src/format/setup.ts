import { formatTrimmed } from './quantities';
import { capitalised } from './words';

/** What is said of a run's set-up, in the words of the sheets. */

const PART_WORDS = {
  mode: 'operating mode',
  supply: 'supply',
  cables: 'cable layout',
  ancillary: 'ancillary equipment',
  temperature: 'temperature',
  humidity: 'relative humidity',
  deviations: 'deviations from the plan',
  stayed: 'whether the EUT stayed in its mode',
  photograph: 'a photograph',
} as const;
export type SetupPartName = keyof typeof PART_WORDS;
const PARTS = Object.keys(PART_WORDS).length;

/** `Not said: temperature, relative humidity and a photograph.` Null when all is said. */
export function unsaidText(unsaid: readonly SetupPartName[]): string | null {
  if (unsaid.length === 0) return null;
  if (unsaid.length === PARTS) return 'Nothing is recorded of the set-up.';
  return `Not said: ${listed(unsaid.map((part) => PART_WORDS[part]))}.`;
}

/** `The EUT did not stay in its mode: restarted at 144 MHz.` Null when it stayed, or nobody has said. */
export function strayedText(whatHappened: string | null): string | null {
  if (whatHappened === null) return null;
  const told = whatHappened.trim();
  return `The EUT did not stay in its mode: ${told}${/[.;:?]$/.test(told) ? '' : '.'}`;
}

/** Of a list's run: `mode not held`, short enough for a row. */
export const STRAYED_MARK = 'mode not held';

export const STAYED_WORDS = {
  yes: 'stayed in its mode',
  no: 'did not stay in its mode',
  'not-watched': 'was not watched',
};

interface Supply {
  supplyKind: 'ac' | 'dc' | null;
  supplyV: number | null;
  supplyFrequencyHz: number | null;
  supplySource: string | null;
}

/** `230 V AC, 50 Hz, mains through the AMN`. Null when nobody has said. */
export function supplyText({ supplyKind, supplyV, supplyFrequencyHz, supplySource }: Supply): string | null {
  const kind = supplyKind?.toUpperCase();
  const volts = supplyV === null ? kind : [`${formatTrimmed(supplyV, 2)} V`, kind].filter(Boolean).join(' ');
  const hertz = supplyFrequencyHz === null ? null : `${formatTrimmed(supplyFrequencyHz, 2)} Hz`;
  const said = [volts, hertz, supplySource].filter(Boolean).join(', ');
  return said === '' ? null : said;
}

/** `21.5 °C, 45 % relative humidity`. Null when nobody has said. */
export function climateText({
  temperatureC,
  humidityPct,
}: {
  temperatureC: number | null;
  humidityPct: number | null;
}) {
  const said = [
    temperatureC === null ? null : `${formatTrimmed(temperatureC, 1)} °C`,
    humidityPct === null ? null : `${formatTrimmed(humidityPct, 1)} % relative humidity`,
  ].filter(Boolean);
  return said.length === 0 ? null : said.join(', ');
}

/** The one line a set-up folds to. */
export function setupSummary(brief: {
  revision: number | null;
  eutStayed: 'yes' | 'no' | 'not-watched' | null;
  unsaid: readonly SetupPartName[];
}): string {
  if (brief.eutStayed === 'no') return 'the EUT did not stay in its mode';
  if (brief.unsaid.length === PARTS) return 'nothing recorded';
  if (brief.unsaid.length === 0) return 'recorded';
  return brief.unsaid.length === 1 ? `not said: ${PART_WORDS[brief.unsaid[0]!]}` : `${brief.unsaid.length} not said`;
}

/** What a picture is called where it has no caption. */
export function photoText(caption: string): string {
  return caption === '' ? 'Photograph of the set-up, without a caption' : capitalised(caption);
}

interface RunSetup {
  number: string;
  setup: {
    eutStayed: 'yes' | 'no' | 'not-watched' | null;
    whatHappened: string | null;
    unsaid: readonly SetupPartName[];
  };
}

/** What the runs of a port leave unsaid of their set-ups, and which EUT did not stay in its mode; no verdict hangs on it. */
export function setupsText(runs: readonly RunSetup[]): { text: string; remark: boolean }[] {
  const strayed = runs.flatMap(({ number, setup }) => {
    const text = strayedText(setup.eutStayed === 'no' ? setup.whatHappened : null);
    return text === null ? [] : [{ text: `${number}: ${text}`, remark: true }];
  });
  const none = runs.filter(({ setup }) => setup.unsaid.length === PARTS).map(({ number }) => number);
  const silent = none.length === 0 ? [] : [{ text: `Set-up of ${listed(none)}: nothing is recorded.`, remark: false }];
  const some = runs.flatMap(({ number, setup: { unsaid } }) =>
    unsaid.length === 0 || unsaid.length === PARTS
      ? []
      : [{ text: `Set-up of ${number}: ${lowered(unsaidText(unsaid)!)}`, remark: false }],
  );
  return [...strayed, ...silent, ...some];
}

const lowered = (text: string) => text.charAt(0).toLowerCase() + text.slice(1);

function listed(words: readonly string[]): string {
  return words.length === 1 ? words[0]! : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
