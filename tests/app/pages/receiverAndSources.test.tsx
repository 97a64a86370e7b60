import { renderToStaticMarkup } from 'react-dom/server';
import type { Actor } from '@/auth/actor';
import { closePasswordWorkers } from '@/auth/passwordWorker';
import { receiverSection } from '@/app/(lab)/sweeps/[id]/receiverSection';
import { sourcesSection } from '@/app/(lab)/sweeps/[id]/sourcesSection';
import { oneIn } from '@/app/(lab)/sweeps/[id]/sourceWords';
import { timeText } from '@/app/(lab)/sweeps/[id]/receiverWords';
import { addProductClock } from '@/services/clocks';
import { keepSweep } from '@/services/keepSweep';
import { readLikelySources } from '@/services/likelySources';
import { readReceiverCheck } from '@/services/receiverCheck';
import { createSweepFile } from '@/services/sweepFiles';
import { freshDatabase, type TestDatabase } from '../../support/database';
import { enterWorld, sweepFile, type World } from '../../support/world';

let reader: Actor;
jest.mock('@/app/requireActor', () => ({ requireActor: async () => reader }));
jest.mock('next/navigation', () => ({
  ...jest.requireActual<object>('next/navigation'),
  useRouter: () => ({}),
  usePathname: () => '/',
}));

let schema: TestDatabase;
let world: World;
beforeAll(async () => {
  schema = await freshDatabase();
  world = await enterWorld();
}, 120_000);
afterAll(async () => {
  await closePasswordWorkers();
  await schema.close();
});

const words = (html: string) =>
  html
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ ([.,:;])/g, '$1');
const said = (part: { children?: React.ReactNode }) => words(renderToStaticMarkup(part.children));
const drawing = { clockHz: null, onClock: () => undefined };

test('the part folds to what is not in order first, and says each setting with its figures', async () => {
  const part = receiverSection(await readReceiverCheck(world.technician.actor, world.run.id));
  expect(words(renderToStaticMarkup(part.summary))).toContain('step too wide, bands C and D');
  const text = said(part);
  expect(text).toContain('bands C and D, 30–1000 MHz');
  expect(text).toContain('RBW 120 kHz, as asked (120 kHz).');
  expect(text).toContain('Step 100 kHz is wider than half the RBW (60 kHz). A narrow peak may read up to 4.2 dB low.');
  expect(text).toContain('The dwell time is not stated.');
  expect(text).toContain(
    'Noise floor at least 6 dB below CISPR 32 class B, enclosure, 3 m, quasi-peak; nearest 24.0 dB',
  );
  expect(text).toContain('Overload is not stated. The highest reading at the input is 60.2 dBµV.');
  expect(text).toContain('CISPR 16-1-1:2019 Table 1');
  expect(text).not.toMatch(/\b(pass|fail)(ed|es|s)?\b/i);
});

test('likely sources name harmonic, frequency and margin, and what nothing explains', async () => {
  const { actor } = world.technician;
  const readings = { 60: 52, 84: 52, 144: 60.2, 101.3: 52 };
  const { id: fileId } = await createSweepFile(actor, sweepFile(readings, 'clock.csv'));
  const run = await keepSweep(actor, { ...world.choice, ...world.about, fileId });
  const clock = { kind: 'clock' as const, frequencyHz: 12e6, tolerancePpm: 100, spread: null, note: '' };
  await addProductClock(actor, world.product.id, { ...clock, name: 'controller clock' });
  const part = sourcesSection({ view: await readLikelySources(actor, run.id) }, drawing);
  expect(part.summary).toBe('3 of 4 explained');
  const text = said(part);
  expect(text).toContain('controller clock Draw harmonics of 12 MHz');
  expect(text).toContain('×12 144.000 MHz, 6.2 over');
  expect(text).toContain('Unexplained 101.300 MHz, 2.0 under');
  expect(text).toContain('A probe at the board shows what is.');
});

test('while they are looked for, and where they cannot be had, the part says so', () => {
  expect(sourcesSection('looking', drawing).summary).toBe('looking');
  const problem = { status: 429, title: 'Too much at once', detail: 'Try again in a few seconds.', errors: [] };
  expect(said(sourcesSection({ problem } as never, drawing))).toContain('Try again in a few seconds.');
});

test.each([
  ['a designer', () => world.designer.actor],
  ['a technician', () => world.technician.actor],
] as const)('the run sheet shows %s both parts, and no style in its markup', async (_who, actor) => {
  reader = actor();
  const { default: Page } = await import('@/app/(lab)/sweeps/[id]/page');
  const html = renderToStaticMarkup(await Page({ params: Promise.resolve({ id: world.run.id }) }));
  expect(words(html)).toContain('Likely sources');
  expect(words(html)).toContain('Receiver');
  expect(html.match(/\sstyle="[^"]*"/g) ?? []).toEqual([]);
});

test('the product sheet lists what is declared, who declared it and how sure it is', async () => {
  reader = world.designer.actor;
  const spread = { kind: 'down' as const, pct: 0.5 };
  const bus = { kind: 'clock' as const, frequencyHz: 24.576e6, tolerancePpm: 50, spread, note: 'audio board' };
  await addProductClock(world.designer.actor, world.product.id, { ...bus, name: 'audio clock' });
  const { default: Page } = await import('@/app/(lab)/products/[id]/page');
  const html = renderToStaticMarkup(await Page({ params: Promise.resolve({ id: world.product.id }) }));
  expect(words(html)).toContain('24.576 MHz audio clock, ±50 ppm, spread 0.5 % down');
  expect(words(html)).toContain('audio board; declared by designer');
});

test.each([
  [0.0099, 'one in 100'],
  [0.00031, 'one in 3\u202f200'],
  [1e-9, 'one in a million'],
])('a chance of %p is %s', (probability, text) => expect(oneIn(probability)).toBe(text));

test.each([
  [6e-5, '0.06 ms'],
  [0.01, '10 ms'],
  [1.5, '1.5 s'],
])('%p s is written %s', (seconds, text) => expect(timeText(seconds)).toBe(text));
