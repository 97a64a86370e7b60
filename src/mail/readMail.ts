/*
 * Reads an e-mail back as plain text, for the demo's catcher. Understands what e-mail programs write: folded headers,
 * encoded words (RFC 2047), quoted-printable and base64 (RFC 2045 6), parts inside parts (RFC 2046 5.1).
 */

export interface ReadMail {
  messageId: string;
  from: string;
  to: string;
  subject: string;
  /** Its plain text; the html as it stands when that is all there is. */
  text: string;
}

interface Part {
  headers: Map<string, string>;
  body: Buffer;
}

const DEEPEST = 5;

function splitPart(raw: Buffer): Part {
  const source = raw.toString('latin1');
  // a part without headers of its own begins with the empty line
  const gap = /^\r?\n|\r?\n\r?\n/.exec(source);
  const head = gap ? source.slice(0, gap.index) : source;
  const headers = new Map<string, string>();
  for (const line of head.replace(/\r?\n[ \t]+/g, ' ').split(/\r?\n/)) {
    const at = line.indexOf(':');
    if (at > 0) headers.set(line.slice(0, at).trim().toLowerCase(), line.slice(at + 1).trim());
  }
  return { headers, body: gap ? raw.subarray(gap.index + gap[0].length) : Buffer.alloc(0) };
}

function decodeText(bytes: Buffer, charset: string): string {
  try {
    return new TextDecoder(charset).decode(bytes);
  } catch {
    // a charset nobody knows
    return bytes.toString('latin1');
  }
}

function quotedPrintable(text: string): Buffer {
  const joined = text.replace(/=[ \t]*\r?\n/g, '');
  return Buffer.from(
    joined.replace(/=([0-9A-Fa-f]{2})/g, (_whole, hex: string) => String.fromCharCode(parseInt(hex, 16))),
    'latin1',
  );
}

/** `=?UTF-8?Q?Gr=C3=BC=C3=9Fe?=` is Grüße; the gap between two encoded words is none. */
export function decodeWords(header: string): string {
  const joined = header.replace(/\?=\s+=\?/g, '?==?');
  const encoded = /=\?([^?*\s]+)(?:\*[^?]*)?\?([QqBb])\?([^?]*)\?=/g;
  const decoded = joined.replace(encoded, (_whole, charset: string, how: string, text: string) => {
    const base64 = how.toUpperCase() === 'B';
    return decodeText(base64 ? Buffer.from(text, 'base64') : quotedPrintable(text.replaceAll('_', ' ')), charset);
  });
  // Headers in UTF-8 as they are (RFC 6532) came in as latin1.
  return /[\x80-\xff]/.test(header) ? Buffer.from(header, 'latin1').toString('utf8') : decoded;
}

function parameter(header: string, name: string): string | null {
  const found = new RegExp(`;\\s*${name}\\s*=\\s*(?:"([^"]*)"|([^;\\s]+))`, 'i').exec(header);
  return found?.[1] ?? found?.[2] ?? null;
}

function decodedBody({ headers, body }: Part): string {
  const how = (headers.get('content-transfer-encoding') ?? '').toLowerCase();
  const plain = body.toString('latin1');
  const bytes =
    how === 'base64' ? Buffer.from(plain, 'base64') : how === 'quoted-printable' ? quotedPrintable(plain) : body;
  return decodeText(bytes, parameter(headers.get('content-type') ?? '', 'charset') ?? 'utf-8').replace(/\r\n/g, '\n');
}

function partsOf(part: Part, boundary: string): Part[] {
  const source = part.body.toString('latin1');
  const line = `--${boundary}`.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
  const between = source.split(new RegExp(`(?:^|\\r?\\n)${line}(?:--)?[ \\t]*(?=\\r?\\n|$)`));
  return between.slice(1).map((text) => splitPart(Buffer.from(text.replace(/^\r?\n/, ''), 'latin1')));
}

/** The first text/plain below a part; failing that the first text/html. */
function textBelow(part: Part, wanted: 'text/plain' | 'text/html', depth = 0): string | null {
  const type = part.headers.get('content-type') ?? 'text/plain';
  const boundary = parameter(type, 'boundary');
  if (/^multipart\//i.test(type) && boundary !== null && depth < DEEPEST) {
    for (const inner of partsOf(part, boundary)) {
      const text = textBelow(inner, wanted, depth + 1);
      if (text !== null) return text;
    }
    return null;
  }
  return type.toLowerCase().startsWith(wanted) ? decodedBody(part) : null;
}

export function readMail(raw: Buffer): ReadMail {
  const whole = splitPart(raw);
  const header = (name: string) => decodeWords(whole.headers.get(name) ?? '');
  return {
    messageId: header('message-id'),
    from: header('from'),
    to: header('to'),
    subject: header('subject'),
    text: textBelow(whole, 'text/plain') ?? textBelow(whole, 'text/html') ?? '',
  };
}
