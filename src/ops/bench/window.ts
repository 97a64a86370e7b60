import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { rounded, say, timed } from './measure';
import type { Product } from './product';

/** A server of the bare platform that answers one body, to hold the product's own against. */
function bareServer(body: string): Promise<{ origin: string; server: Server }> {
  const server = createServer((_request, response) => {
    response.writeHead(200, { 'content-type': 'application/json' }).end(body);
  });
  return new Promise((resolve) =>
    server.listen(0, '127.0.0.1', () =>
      resolve({ origin: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, server }),
    ),
  );
}

/** Windows of a run beside a route that does nothing, and beside the bare platform sending the same bytes. */
export async function benchWindow({ origin, cookie }: Product, runId: string, points: number): Promise<void> {
  const ask = async (url: string) => (await fetch(url, { headers: { cookie } })).text();
  const window = (fromHz: number, toHz: number) =>
    `${origin}/api/sweeps/${runId}/window?fromHz=${fromHz}&toHz=${toHz}&columns=1024`;
  const body = await ask(window(144e6, 150e6));
  const { origin: bare, server } = await bareServer(body);
  const bareServerMs = (await timed(() => ask(bare), 40)).ms;
  const trivialMs = (await timed(() => ask(`${origin}/api/health`), 40)).ms;
  const whole = (await timed(() => ask(window(1e6, 2e9)), 20)).ms;
  const close = (await timed(() => ask(window(144e6, 150e6)), 20)).ms;
  const wide = (await timed(() => ask(window(100e6, 400e6)), 10)).ms;
  server.close();
  say({
    bench: 'window',
    points,
    replyBytes: body.length,
    bareServerSameBytesMs: bareServerMs,
    trivialRouteMs: trivialMs,
    wholeMs: whole,
    sixMegahertzMs: close,
    threeHundredMegahertzMs: wide,
    wholeBesideTrivialMs: rounded(whole - trivialMs),
    sixMegahertzBesideTrivialMs: rounded(close - trivialMs),
    threeHundredMegahertzBesideTrivialMs: rounded(wide - trivialMs),
  });
}
