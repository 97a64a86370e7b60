import type { Server } from 'node:http';

/**
 * Stops accepting connections and lets the requests in flight finish; whatever still runs after the limit is cut.
 * @returns true when everything finished by itself
 */
export function drain(server: Server, limitMilliseconds: number): Promise<boolean> {
  return new Promise((resolve) => {
    const idle = setInterval(() => server.closeIdleConnections(), 100);
    const limit = setTimeout(() => {
      clearInterval(idle);
      server.closeAllConnections();
      resolve(false);
    }, limitMilliseconds);
    server.close(() => {
      clearInterval(idle);
      clearTimeout(limit);
      resolve(true);
    });
    server.closeIdleConnections();
  });
}

/** Calls `stop` once, on SIGTERM, SIGINT, or when the process that started this one is gone. */
export function onStop(stop: (reason: string) => void): void {
  let stopping = false;
  const once = (reason: string) => {
    if (stopping) return;
    stopping = true;
    stop(reason);
  };
  process.on('SIGTERM', () => once('SIGTERM'));
  process.on('SIGINT', () => once('SIGINT'));
  process.on('disconnect', () => once('parent gone'));
}
