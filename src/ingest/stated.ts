/**
 * What the lines before a table state of it, as `Detector;quasi-peak` or `# Distance: 3 m`. Only the words that a
 * factor table or a limit line is described by are looked for; everything found is a proposal.
 */
export interface StatedField {
  value: string;
  line: number;
}

const FIELDS = {
  name: /^(?:limit ?line|table|name|title)$/,
  key: /^key$/,
  document: /^(?:document|standard|norm)$/,
  class: /^class$/,
  port: /^port$/,
  detector: /^detector$/,
  bandwidth: /^(?:bandwidth|rbw|resolution bandwidth|measuring bandwidth)(?: \(?hz\)?)?$/,
  unit: /^(?:limit )?unit$/,
  distance: /^(?:measuring )?distance(?: \(?m\)?)?$/,
  polarisation: /^polari[sz]ation$/,
  quantity: /^quantity$/,
  source: /^source$/,
  basis: /^basis$/,
  between: /^(?:straight in|interpolation|between)$/,
} as const;
export type StatedKey = keyof typeof FIELDS;
export type Stated = Partial<Record<StatedKey, StatedField>>;

/** The first word-and-value pair of each field among some lines; later ones do not count. */
export function statedIn(lines: readonly { line: number; text: string }[]): Stated {
  const stated: Stated = {};
  for (const { line, text } of lines) {
    const found = /^\s*(?:[#!%]|\/\/)*\s*"?([a-z][a-z ()]{0,40}?)"?\s*[:;=,\t|]\s*(.+?)[\s;,\t|]*$/i.exec(text);
    if (!found) continue;
    const word = found[1]!.toLowerCase().trim();
    const key = (Object.keys(FIELDS) as StatedKey[]).find((one) => FIELDS[one].test(word));
    if (key && !stated[key]) stated[key] = { value: unquoted(found[2]!), line };
  }
  return stated;
}

function unquoted(text: string): string {
  const quoted = /^"((?:[^"]|"")*)"$/.exec(text.trim());
  return quoted ? quoted[1]!.replaceAll('""', '"') : text.trim();
}

/** A written quantity with its prefix, `120 kHz` or `9000`, in the bare unit; null when it is none. */
export function statedQuantity(text: string, unit: 'Hz' | 'm'): number | null {
  const found = /^\s*(\d+(?:[.,]\d+)?)\s*([kMG]?)(hz|m|metres?|meters?)?\s*$/i.exec(text);
  if (!found) return null;
  const prefix = unit === 'm' ? '' : (found[2] ?? '').toLowerCase();
  const shift = { '': 0, k: 3, m: 6, g: 9 }[prefix] ?? 0;
  const value = Number(`${found[1]!.replace(',', '.')}e${shift}`);
  return Number.isFinite(value) && value > 0 ? value : null;
}
