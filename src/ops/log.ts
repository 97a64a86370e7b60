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

/**
 * Whoever collects the output may end first: from then on lines are dropped and the process goes on. Without this the
 * failed write is an error that is logged, which fails again, without end.
 */
export function outliveReader(): void {
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE') throw error;
    });
  }
}
