import type { LevelUnit, LineDetector } from '@/emc/kinds';
import type { FinalsBody, TypedFinal } from '@/schemas/finals';

/** Finals of one position read with the same detectors and bandwidth: what one file, and so one run, holds. */
export interface FinalsGroup {
  detectors: LineDetector[];
  rbwHz: number;
  /** With the place of each among the finals that were sent. */
  finals: { final: TypedFinal; index: number }[];
}

const DETECTOR_ORDER: readonly LineDetector[] = ['peak', 'quasi-peak', 'average'];
const DETECTOR_HEADS: Record<LineDetector, string> = {
  peak: 'Peak',
  'quasi-peak': 'Quasi-peak',
  average: 'Average',
};
const UNIT_HEADS: Partial<Record<LevelUnit, string>> = {
  dBuV: 'dBµV',
  'dBuV/m': 'dBµV/m',
  dBuA: 'dBµA',
  'dBuA/m': 'dBµA/m',
};

/** A table has a level in every row of a column, so finals with other detectors, or another bandwidth, are another. */
export function groupFinals(finals: readonly TypedFinal[]): FinalsGroup[] {
  const groups = new Map<string, FinalsGroup>();
  for (const [index, final] of finals.entries()) {
    const read = new Set(final.readings.map(({ detector }) => detector));
    const detectors = DETECTOR_ORDER.filter((detector) => read.has(detector));
    const key = `${detectors.join()} ${final.rbwHz}`;
    const group = groups.get(key) ?? { detectors, rbwHz: final.rbwHz, finals: [] };
    groups.set(key, group);
    group.finals.push({ final, index });
  }
  return [...groups.values()].map((group) => ({
    ...group,
    finals: group.finals.sort((a, b) => a.final.frequencyHz - b.final.frequencyHz),
  }));
}

/** What the file says of itself. */
export interface FinalsFacts {
  by: string;
  at: Date;
  job: string;
  sample: string;
  state: string;
  /** `enclosure, horizontal` */
  place: string;
  /** Numbers of the retests by their ids. */
  retests: ReadonlyMap<string, string>;
}

const ABSENT = '–';

/**
 * The typed readings as a sweep file of a plain shape: remarks that say who typed them, when and for which retests, then
 * frequency and level per detector, and per row height, azimuth, time, retests and remark. ASCII apart from µ, the dash
 * and what people typed; semicolons, decimal points, lines that end in LF.
 */
export function finalsFile(
  { detectors, rbwHz, finals }: FinalsGroup,
  { unit }: Pick<FinalsBody, 'unit'>,
  facts: FinalsFacts,
): { name: string; bytes: Uint8Array } {
  const numberOf = (id: string) => facts.retests.get(id) ?? id;
  const all = [...new Set(finals.flatMap(({ final }) => final.retestIds.map(numberOf)))].sort();
  const columns: [name: string, cells: string[]][] = [
    ['Frequency (MHz)', finals.map(({ final }) => String(final.frequencyHz / 1e6))],
    ...detectors.map((detector): [string, string[]] => [
      `${DETECTOR_HEADS[detector]} (${UNIT_HEADS[unit] ?? unit})`,
      finals.map(({ final }) => String(final.readings.find((one) => one.detector === detector)!.level)),
    ]),
    position(
      'Height',
      'm',
      finals.map(({ final }) => final.heightM),
    ),
    position(
      'Azimuth',
      'deg',
      finals.map(({ final }) => final.azimuthDeg),
    ),
    ['Time', finals.map(({ final }) => final.readAt ?? ABSENT)],
    ['Retests and remark', finals.map(({ final }) => said(final.retestIds.map(numberOf), final.remark))],
  ];
  const lines = [
    '# Finals typed at the bench, not exported by a receiver',
    `# Typed by ${flat(facts.by)}`,
    `# Kept at ${facts.at.toISOString()}`,
    `# Job ${flat(facts.job)}, sample ${flat(facts.sample)} ${flat(facts.state)}, ${flat(facts.place)}`,
    `# For ${all.join(', ')}`,
    `# RBW: ${rbwHz} Hz`,
    columns.map(([name]) => name).join(';'),
    ...finals.map((_, row) => columns.map(([, cells]) => quoted(cells[row]!)).join(';')),
  ];
  const stamp = facts.at
    .toISOString()
    .replace(/[-:]|\.\d+Z$/g, '')
    .replace('T', '-');
  const place = facts.place.replace(/[^a-z0-9]+/gi, '-').toLowerCase();
  const name = `finals-${facts.sample}-${facts.state}-${place}-${stamp}.csv`;
  return { name, bytes: new TextEncoder().encode(`${lines.join('\n')}\n`) };
}

/** Figures where every row has one; else words, since a column that is empty in some rows is read as broken. */
function position(name: string, unit: string, values: readonly (number | null)[]): [string, string[]] {
  if (values.every((value) => value !== null)) return [`${name} ${unit}`, values.map(String)];
  return [name, values.map((value) => (value === null ? ABSENT : `${value} ${unit}`))];
}

/** Never a figure alone, so that a row is a row whatever was remarked. */
function said(retests: readonly string[], remark: string | null): string {
  return [retests.join(' '), flat(remark ?? '')].filter((text) => text !== '').join(', ');
}

const flat = (text: string) => text.replace(/\s+/g, ' ').trim();
const quoted = (text: string) => (/[";]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
