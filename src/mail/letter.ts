/** What an e-mail of the lab says, in order. A link stands on a line of its own, so that no reader breaks it. */
export type LetterPart = string | { link: string; says: string } | { lines: readonly string[] };

const escaped = (text: string) => text.replace(/[&<>"']/g, (c) => `&#${c.charCodeAt(0)};`);

/** Text without line ends and other control characters, as it has to be where one line is one thing. */
export function oneLine(text: string): string {
  return text
    .replace(/[\p{Cc}\u2028\u2029]+/gu, ' ')
    .replace(/ {2,}/g, ' ')
    .trim();
}

function htmlOf(part: LetterPart): string {
  if (typeof part === 'string') return `<p>${escaped(part)}</p>`;
  if ('lines' in part) return `<p>${part.lines.map(escaped).join('<br>')}</p>`;
  return `<p><a href="${escaped(part.link)}">${escaped(part.says)}</a><br>${escaped(part.link)}</p>`;
}

function textOf(part: LetterPart): string {
  if (typeof part === 'string') return part;
  return 'lines' in part ? part.lines.join('\n') : `${part.says}:\n${part.link}`;
}

/** The same words as plain text and as html without scripts, images or anything to fetch. */
export function letter(parts: readonly LetterPart[]): { text: string; html: string } {
  const style = 'font:16px/1.5 sans-serif;color:#16211e;max-width:36em';
  const body = parts.map(htmlOf).join('\n');
  return {
    text: `${parts.map(textOf).join('\n\n')}\n`,
    html: `<!doctype html>\n<html lang="en"><body style="${style}">\n${body}\n</body></html>\n`,
  };
}
