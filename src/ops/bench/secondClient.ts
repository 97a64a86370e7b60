import { request, Agent } from 'node:http';

/*
 * Somebody else, in a process of their own, who asks a trivial route and a page again and again while the bench imports.
 * Arguments: origin, cookie, the page. Each answer is one line: which, when it was asked, how long it took.
 */

const [origin, cookie, page] = process.argv.slice(2) as [string, string, string];
const agent = new Agent({ keepAlive: true, maxSockets: 4 });
const EVERY_MS = 15;

function ask(which: 'trivial' | 'page', url: string): Promise<void> {
  const at = Date.now();
  const start = performance.now();
  return new Promise((resolve, reject) => {
    const asked = request(url, { agent, headers: { cookie } }, (answer) => {
      answer.resume();
      answer.once('end', () => {
        const ms = performance.now() - start;
        process.stdout.write(`${JSON.stringify({ which, at, ms, status: answer.statusCode })}\n`);
        resolve();
      });
    });
    asked.once('error', reject);
    asked.end();
  });
}

async function keepAsking(which: 'trivial' | 'page', url: string): Promise<never> {
  for (;;) {
    await ask(which, url);
    await new Promise((resolve) => setTimeout(resolve, EVERY_MS));
  }
}

process.once('disconnect', () => process.exit(0));
Promise.all([keepAsking('trivial', `${origin}/api/health`), keepAsking('page', `${origin}${page}`)]).catch(() =>
  process.exit(1),
);
