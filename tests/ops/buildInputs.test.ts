import { mkdirSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { buildIsFresh, hashInputs, noteBuild } from '@/ops/buildInputs';

let root: string;
const write = (file: string, text: string) => {
  mkdirSync(path.dirname(path.join(root, file)), { recursive: true });
  writeFileSync(path.join(root, file), text);
};

beforeEach(() => {
  root = mkdtempSync(path.join(tmpdir(), 'stillfield-build-'));
  write('src/app/page.tsx', 'one');
  write('src/ops/start.js', 'one');
  write('package-lock.json', '{}');
});
afterEach(() => rmSync(root, { recursive: true }));

test('the same files give the same hash', () => expect(hashInputs(root)).toBe(hashInputs(root)));

test.each([
  ['a changed page', () => write('src/app/page.tsx', 'two')],
  ['a new page', () => write('src/app/jobs/page.tsx', 'one')],
  ['a renamed page', () => renameSync(path.join(root, 'src/app/page.tsx'), path.join(root, 'src/app/other.tsx'))],
  ['other packages', () => write('package-lock.json', '{"a":1}')],
  ['a public file', () => write('public/mark.svg', '<svg/>')],
  ['bytes moved from one file to the next', () => [write('src/app/page.tsx', 'on'), write('src/app/page.tsy', 'e')]],
])('%s changes it', (_, change) => {
  const before = hashInputs(root);
  change();
  expect(hashInputs(root)).not.toBe(before);
});

test('the scripts and the outbox are not built', () => {
  const before = hashInputs(root);
  write('src/ops/start.js', 'two');
  write('src/outbox/main.ts', 'one');
  write('README.md', 'one');
  expect(hashInputs(root)).toBe(before);
});

test('a build is fresh while its sources are as they were', () => {
  const stamp = path.join(root, 'stamp');
  expect(buildIsFresh(root, '.next', stamp)).toBe(false);
  noteBuild(stamp, hashInputs(root));
  expect(buildIsFresh(root, '.next', stamp)).toBe(false);
  write('.next/BUILD_ID', 'x');
  expect(buildIsFresh(root, '.next', stamp)).toBe(true);
  write('src/app/page.tsx', 'two');
  expect(buildIsFresh(root, '.next', stamp)).toBe(false);
});
