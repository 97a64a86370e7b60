import type { LineDetector, LineUnit, MainsLine, Polarisation, Port } from '@/emc/kinds';
import { formatMargin, unitLabel } from './quantities';
import { DETECTOR_WORDS, PORT_WORDS } from './words';

/** An emission to measure, as the retest queue holds it. */
export interface Listed {
  number: string;
  reason: 'over' | 'needs-final' | 'repeat-prescan';
  status: string;
  statusReason: string;
  sample: { code: string; serial: string };
  state: { label: string };
  port: Port;
  position: Polarisation | MainsLine | null;
  waitsAt: readonly (Polarisation | MainsLine | null)[];
  line: { detector: LineDetector; bandwidthHz: number; unit: LineUnit } | null;
  kind: 'peak' | 'floor' | 'repeat-prescan';
  frequencyHz: number | null;
  fromHz: number | null;
  toHz: number | null;
  level: number | null;
  limit: number | null;
  marginDb: number | null;
  heightM: number | null;
  azimuthDeg: number | null;
  run: { number: string } | null;
  because: string | null;
}

interface Column {
  name: string;
  /** Text may hold what somebody typed; a figure is written by us. */
  text?: boolean;
  cell: (item: Listed) => string;
}

/** A figure for another program: a point, an ASCII minus, no gaps; nothing where there is none. */
function plain(value: number | null, decimals: number): string {
  return value === null ? '' : value.toFixed(decimals);
}

/** To the hertz: a receiver is tuned to it. */
const megahertz = (hz: number | null) => plain(hz === null ? null : hz / 1e6, 6);

const REASONS = { over: 'over', 'needs-final': 'needs a final', 'repeat-prescan': 'repeat the prescan' };

const columns = (unitOf: (unit: LineUnit) => string): Column[] => [
  { name: 'Ref', text: true, cell: (item) => item.number },
  { name: 'Sample', text: true, cell: (item) => item.sample.code },
  { name: 'Serial', text: true, cell: (item) => item.sample.serial },
  { name: 'State', text: true, cell: (item) => item.state.label },
  { name: 'Port', text: true, cell: (item) => PORT_WORDS[item.port] },
  { name: 'Measure in', text: true, cell: (item) => item.waitsAt.flatMap((one) => one ?? []).join(' and ') },
  { name: 'Frequency (MHz)', cell: (item) => megahertz(item.frequencyHz) },
  { name: 'From (MHz)', cell: (item) => megahertz(item.kind === 'floor' ? item.fromHz : null) },
  { name: 'To (MHz)', cell: (item) => megahertz(item.kind === 'floor' ? item.toHz : null) },
  { name: 'Detector', text: true, cell: ({ line }) => (line ? DETECTOR_WORDS[line.detector] : '') },
  { name: 'RBW (kHz)', cell: ({ line }) => (line ? String(Number((line.bandwidthHz / 1e3).toPrecision(6))) : '') },
  { name: 'Limit', cell: (item) => plain(item.limit, 1) },
  { name: 'Last level', cell: (item) => plain(item.level, 1) },
  { name: 'Unit', text: true, cell: ({ line }) => (line ? unitOf(line.unit) : '') },
  { name: 'Margin (dB)', text: true, cell: ({ marginDb }) => (marginDb === null ? '' : formatMargin(marginDb)) },
  { name: 'Worst in', text: true, cell: (item) => item.position ?? '' },
  { name: 'Height (m)', cell: (item) => plain(item.heightM, 2) },
  { name: 'Azimuth (deg)', cell: (item) => plain(item.azimuthDeg, 0) },
  { name: 'Reason', text: true, cell: (item) => REASONS[item.reason] },
  { name: 'Status', text: true, cell: (item) => item.status },
  { name: 'Why', text: true, cell: (item) => item.statusReason },
  { name: 'Run', text: true, cell: ({ run }) => run?.number ?? '' },
];

/**
 * Emissions as a file for the receiver: comma-separated (RFC 4180, ASCII apart from what people typed) or in columns of
 * fixed width. The first row names the columns with their units; there is no other preamble. Lines end in CR LF.
 */
export function frequencyListFile(
  items: readonly Listed[],
  format: 'csv' | 'txt',
): { name: string; type: string; text: string } {
  const name = `frequency-list.${format}`;
  if (format === 'csv') return { name, type: 'text/csv; charset=utf-8; header=present', text: asCsv(items) };
  return { name, type: 'text/plain; charset=utf-8', text: asColumns(items) };
}

function asCsv(items: readonly Listed[]): string {
  const all = columns((unit) => unit);
  const head = all.map(({ name }) => quoted(name));
  const rows = items.map((item) => all.map(({ text, cell }) => quoted(text ? harmless(cell(item)) : cell(item))));
  return [head, ...rows].map((row) => `${row.join(',')}\r\n`).join('');
}

/**
 * A spreadsheet takes a cell that begins like this for a formula, whatever stands before it in white space. The
 * apostrophe makes it text.
 */
function harmless(text: string): string {
  return /^[\s\u0000]*[=+\-@\uff1d\uff0b\uff0d\uff20]|^[\t\r\n]/.test(text) ? `'${text}` : text;
}

/** Quotes where RFC 4180 asks for them. */
function quoted(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

function asColumns(items: readonly Listed[]): string {
  const all = columns(unitLabel);
  const flat = (text: string) => text.replace(/\s+/g, ' ').trim();
  const rows = [all.map(({ name }) => name), ...items.map((item) => all.map(({ cell }) => flat(cell(item))))];
  const widths = all.map((_, at) => Math.max(...rows.map((row) => [...row[at]!].length)));
  const padded = (text: string, at: number) => {
    const gap = ' '.repeat(widths[at]! - [...text].length);
    return all[at]!.text ? text + gap : gap + text;
  };
  return rows.map((row) => `${row.map(padded).join('  ').trimEnd()}\r\n`).join('');
}
