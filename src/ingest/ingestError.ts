/** A file or a reading of it that cannot be had: where, what was found, what was expected, and the next step in words. */
export class IngestError extends Error {
  override readonly name = 'IngestError';
  /** 1-based line of the file as it came, null when no single line is to blame. */
  readonly line: number | null;
  readonly found: string;
  readonly expected: string;

  constructor(line: number | null, found: string, expected: string, message: string) {
    super(message);
    this.line = line;
    this.found = found;
    this.expected = expected;
  }
}
