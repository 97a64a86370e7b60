/** One JSON object per line on standard output, for whatever collects the process's output. */
export function logLine(level: 'info' | 'warn' | 'error', event: string, details: Record<string, unknown> = {}): void {
  process.stdout.write(`${JSON.stringify({ time: new Date().toISOString(), level, event, ...details })}\n`);
}

/** An error as log details: name, message and stack, nothing else (driver errors carry SQL and values). */
export function errorDetails(error: unknown): Record<string, unknown> {
  return error instanceof Error
    ? { error: error.name, message: error.message, stack: error.stack }
    : { error: 'unknown', message: String(error) };
}
