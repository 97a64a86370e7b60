/*
 * The API alone behind Node's own server, for tests that need a second process where there is no build: the same
 * handlers, without pages. PORT and HOST as for the web process.
 */
import { createServer } from 'node:http';
import { Readable } from 'node:stream';
import { onStop } from '../../src/ops/drain';
import { routesOf } from './routes';

async function main(): Promise<void> {
  const call = await routesOf();
  const server = createServer((request, response) => {
    const { method = 'GET', url = '/', headers } = request;
    const body = method === 'GET' || method === 'HEAD' ? undefined : (Readable.toWeb(request) as ReadableStream);
    const init = { method, headers: headers as Record<string, string>, body, duplex: 'half' } as RequestInit;
    void call(new Request(`http://${headers.host}${url}`, init)).then(async (answer) => {
      response.writeHead(answer.status, [...answer.headers].flat());
      response.end(Buffer.from(await answer.arrayBuffer()));
    });
  });
  onStop(() => server.close(() => process.exit(0)));
  server.listen(Number(process.env.PORT), process.env.HOST);
}

void main();
