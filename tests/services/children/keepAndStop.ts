import { stageSweep } from '@/services/stageSweep';

/* A process that writes a run and never publishes it; tests/services/imports.test.ts kills it. */

const { actor, body } = JSON.parse(process.argv[2]!) as {
  actor: Parameters<typeof stageSweep>[0];
  body: Parameters<typeof stageSweep>[1];
};

stageSweep(actor, body).then(
  () => process.stdout.write('written\n'),
  (error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.stack : String(error)}\n`);
    process.exit(1);
  },
);
setInterval(() => undefined, 1000);
