/*
 * The web process: Next behind a thin server that decides who the client is, limits how long a request may take to
 * arrive, and drains. `--dev` compiles pages as they are asked for.
 */

import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import next from 'next';
import { addressRanges } from '@/config/addresses';
import { env, EnvError } from '@/config/env';
import { drain, onStop } from './drain';
import { forwarded, overwriteForwarded, sameMachineElsewhere } from './forwarded';
import { errorDetails, logLine, outliveReader } from './log';

const DRAIN_LIMIT_MS = 20_000;
/** A 100 MB file over a 2 Mbit/s line takes 400 s. */
const REQUEST_LIMIT_MS = 600_000;
const HEADERS_LIMIT_MS = 15_000;
/** Longer than the 60 s at which common reverse proxies drop an idle connection, so that they close it, not we. */
const KEEP_ALIVE_MS = 65_000;

/** One line for each finished request; assets that answered well are left out, query strings always. */
function logRequest(request: IncomingMessage, response: ServerResponse, address: string, begun: number): void {
  const path = (request.url ?? '').split('?')[0] ?? '';
  if (response.statusCode < 400 && (path.startsWith('/_next/') || path === '/api/health' || path === '/api/ready'))
    return;
  logLine('info', 'request', {
    method: request.method,
    path: path.slice(0, 300),
    status: response.statusCode,
    address,
    milliseconds: Math.round(performance.now() - begun),
    ...(response.writableFinished ? {} : { cut: true }),
  });
}

async function main(): Promise<void> {
  const { APP_ORIGIN, PORT, HOST, TRUSTED_PROXIES } = env();
  const trusted = addressRanges(TRUSTED_PROXIES);
  const dev = process.argv.includes('--dev');
  const app = next({ dev, hostname: HOST, port: PORT });
  await app.prepare();
  const handle = app.getRequestHandler();
  let stopping = false;

  const server = createServer((request, response) => {
    const begun = performance.now();
    const encrypted = 'encrypted' in request.socket;
    const believed = forwarded(request.socket.remoteAddress ?? '', request.headers, trusted, encrypted);
    overwriteForwarded(request.headers, believed);
    if (stopping) response.setHeader('Connection', 'close');
    response.once('close', () => logRequest(request, response, believed.address, begun));
    const elsewhere = sameMachineElsewhere(request.headers, request.url ?? '/', APP_ORIGIN);
    if (elsewhere) {
      response.writeHead(307, { Location: elsewhere }).end();
      return;
    }
    handle(request, response).catch((error: unknown) => {
      logLine('error', 'request failed', errorDetails(error));
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  server.requestTimeout = REQUEST_LIMIT_MS;
  server.headersTimeout = HEADERS_LIMIT_MS;
  server.keepAliveTimeout = KEEP_ALIVE_MS;

  outliveReader();
  onStop((reason) => {
    stopping = true;
    logLine('info', 'draining', { reason });
    void drain(server, DRAIN_LIMIT_MS).then((whole) => {
      logLine(whole ? 'info' : 'warn', 'stopped', { whole });
      process.exit(0);
    });
  });
  server.once('error', (error: NodeJS.ErrnoException) => {
    const taken = `Port ${PORT} on ${HOST} is taken: stop what listens there, or set PORT to another one.`;
    console.error(error.code === 'EADDRINUSE' ? taken : `The web process cannot listen: ${error.message}`);
    process.exit(1);
  });
  server.listen(PORT, HOST, () => logLine('info', 'listening', { host: HOST, port: PORT }));
}

main().catch((error: unknown) => {
  if (error instanceof EnvError) console.error(error.message);
  else logLine('error', 'web process failed', errorDetails(error));
  process.exit(1);
});
