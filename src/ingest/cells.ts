import Papa from 'papaparse';

/** Cells of one line. Whitespace delimiters take runs; quotes are papaparse's business. Cells come trimmed. */
export function splitCells(line: string, delimiter: string): string[] {
  if (delimiter === ' ') {
    const bare = line.includes('"') ? line.replaceAll('"', '') : line;
    return bare.trim().split(/[ \t]+/);
  }
  const parts = line.includes('"')
    ? (Papa.parse<string[]>(line, { delimiter, quoteChar: '"' }).data[0] ?? [])
    : line.split(delimiter);
  return parts.map((part) => part.trim());
}

/** Lines that exporters put among rows as remarks. An option line (`# HZ S DB R 50`) is read elsewhere. */
export function isComment(line: string): boolean {
  return /^\s*"?\s*(?:[#!%]|\/\/)/.test(line);
}

export const DELIMITER_NAMES: Record<string, string> = { '\t': 'tab', ' ': 'space' };

export function delimiterName(delimiter: string): string {
  return DELIMITER_NAMES[delimiter] ?? delimiter;
}
