import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

const ROOT = path.resolve(__dirname, '..');
const SRC = path.join(ROOT, 'src');

/** Who may know whom: the arrow of DEVELOPERS.md. A room may always import from itself. */
const ARROW: Readonly<Record<string, readonly string[]>> = {
  // a page turns what a service throws into its not-found page
  app: ['components', 'http', 'services', 'auth', 'schemas', 'format', 'errors'],
  services: ['models', 'emc', 'ingest', 'auth', 'schemas', 'mail', 'pdf', 'config', 'errors'],
  http: ['services', 'auth', 'schemas', 'errors', 'config'],
  // Next asks for this one file beside app; it runs before every page
  proxy: ['http', 'config'],
  components: ['schemas', 'format', 'emc', 'auth/permissions'],
  models: ['config', 'emc/types', 'emc/kinds'],
  auth: ['schemas', 'config', 'errors'],
  mail: ['config', 'format', 'schemas', 'errors'],
  pdf: ['format', 'schemas', 'emc', 'errors'],
  // an operation names its permission
  schemas: ['emc', 'auth/permissions'],
  format: ['emc'],
  ingest: ['emc'],
  emc: [],
  config: [],
  errors: [],
  ops: ['*'],
  outbox: ['*'],
};

interface Import {
  from: string;
  to: string;
  typeOnly: boolean;
}

function filesBelow(directory: string): string[] {
  return readdirSync(directory).flatMap((name) => {
    const file = path.join(directory, name);
    if (statSync(file).isDirectory()) return filesBelow(file);
    return /\.(ts|tsx|js|mjs|cjs)$/.test(name) ? [file] : [];
  });
}

/** Every module a file names: imports, re-exports, `import()`, `require()`, `import type`, `typeof import()`. */
function importsOf(file: string, text: string): Import[] {
  const found: Import[] = [];
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.ESNext, true);
  const add = (node: ts.Node | undefined, typeOnly = false) => {
    if (node && ts.isStringLiteralLike(node)) found.push({ from: file, to: node.text, typeOnly });
  };
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node)) add(node.moduleSpecifier, node.importClause?.isTypeOnly ?? false);
    else if (ts.isExportDeclaration(node)) add(node.moduleSpecifier, node.isTypeOnly);
    else if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference)) {
      add(node.moduleReference.expression);
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) add(node.argument.literal, true);
    else if (ts.isCallExpression(node)) {
      const called = node.expression;
      const loads =
        called.kind === ts.SyntaxKind.ImportKeyword || (ts.isIdentifier(called) && called.text === 'require');
      if (loads) add(node.arguments[0]);
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** A path inside src for `@/…` and relative names, else null (a package or a Node built-in). */
function inside({ from, to }: Import): string | null {
  const target = to.startsWith('@/')
    ? path.join(SRC, to.slice(2))
    : to.startsWith('.')
      ? path.resolve(from, '..', to)
      : null;
  if (target === null || !target.startsWith(SRC + path.sep)) return null;
  const tried = ['', '.ts', '.tsx', '.js', '.d.ts', '/index.ts', '/index.tsx'].map((end) => target + end);
  const file = tried.find((candidate) => existsSync(candidate) && statSync(candidate).isFile());
  return path.relative(SRC, file ?? target);
}

/** The first directory below src; `errors.ts` is a room of one file. */
const roomOf = (relative: string): string => relative.split(path.sep)[0]!.replace(/\.tsx?$/, '');

function edgeAllowed(from: string, to: string): boolean {
  const [here, there] = [roomOf(from), roomOf(to)];
  if (here === there) return true;
  const allowed = ARROW[here];
  if (!allowed) return false;
  if (allowed.includes('*')) return !['app', 'components'].includes(there);
  const plain = to
    .replace(/\.(d\.)?(ts|tsx|js)$/, '')
    .split(path.sep)
    .join('/');
  return allowed.some((room) => room === there || room === plain);
}

const belongs = (name: string, family: string): boolean => name === family || name.startsWith(`${family}/`);

/** Why a package may not be named in a file, or null. */
function packageProblem(file: string, name: string): string | null {
  const room = roomOf(file);
  const node = name.startsWith('node:');
  if (room === 'emc') return `the core imports nothing, here ${name}`;
  if (belongs(name, 'sequelize') && !['models', 'services', 'config', 'ops', 'outbox'].includes(room)) {
    return 'Sequelize is seen by models and services';
  }
  if (
    belongs(name, 'next') &&
    !['app', 'components', 'proxy'].includes(room) &&
    file !== path.join('ops', 'server.ts')
  ) {
    return 'next/* is seen by app and components';
  }
  if ((belongs(name, 'react') || belongs(name, 'react-dom')) && !['app', 'components'].includes(room)) {
    return 'React is seen by app and components';
  }
  if (node && ['schemas', 'format', 'components'].includes(room))
    return `${room} also runs in the browser, without ${name}`;
  return null;
}

/** One cycle as a list of files that begins and ends with the same one, or null. */
function findCycle(graph: ReadonlyMap<string, readonly string[]>): string[] | null {
  const done = new Set<string>();
  const trail: string[] = [];
  const walk = (file: string): string[] | null => {
    if (trail.includes(file)) return [...trail.slice(trail.indexOf(file)), file];
    if (done.has(file)) return null;
    trail.push(file);
    for (const next of graph.get(file) ?? []) {
      const cycle = walk(next);
      if (cycle) return cycle;
    }
    trail.pop();
    done.add(file);
    return null;
  };
  for (const file of graph.keys()) {
    const cycle = walk(file);
    if (cycle) return cycle;
  }
  return null;
}

const files = filesBelow(SRC);
const imports = files.flatMap((file) => importsOf(file, readFileSync(file, 'utf8')));
const edges = imports.flatMap((found) => {
  const to = inside(found);
  return to === null ? [] : [{ from: path.relative(SRC, found.from), to, typeOnly: found.typeOnly }];
});

test('every room is in the arrow', () => {
  expect(
    [...new Set(files.map((file) => roomOf(path.relative(SRC, file))))].filter((room) => !(room in ARROW)),
  ).toEqual([]);
});

test('imports run one way', () => {
  const wrong = edges.filter(({ from, to }) => !edgeAllowed(from, to)).map(({ from, to }) => `${from} -> ${to}`);
  expect(wrong).toEqual([]);
});

test('every import inside src names a file that exists', () => {
  expect(edges.filter(({ to }) => !existsSync(path.join(SRC, to))).map(({ from, to }) => `${from} -> ${to}`)).toEqual(
    [],
  );
});

test('no file imports itself by way of others, types included', () => {
  const graph = new Map<string, string[]>();
  for (const { from, to } of edges) graph.set(from, [...(graph.get(from) ?? []), to]);
  expect(findCycle(graph)).toBeNull();
});

test('packages stay in their rooms', () => {
  const wrong = imports
    .filter((found) => inside(found) === null && !found.to.startsWith('.') && !found.to.startsWith('@fixtures/'))
    .map((found) => ({ file: path.relative(SRC, found.from), name: found.to }))
    .map(({ file, name }) => ({ file, problem: packageProblem(file, name) }))
    .filter(({ problem }) => problem !== null);
  expect(wrong).toEqual([]);
});

describe('the reader of imports itself', () => {
  const read = (text: string) => importsOf('x.ts', text).map(({ to }) => to);

  test.each([
    ["import { a } from '@/emc/limits'", ['@/emc/limits']],
    ["import type { A } from '@/emc/types'", ['@/emc/types']],
    ["export { a } from './a'", ['./a']],
    ["export * from './a'", ['./a']],
    ["import './globals.css'", ['./globals.css']],
    ["const a = await import('./a')", ['./a']],
    ["const a = require('./a')", ['./a']],
    ["type A = import('./a').A", ['./a']],
    ["import a = require('./a')", ['./a']],
    ['const text = "import x from \'./not-one\'"', []],
    ["// import x from './not-one'", []],
  ])('%s', (text, expected) => expect(read(text)).toEqual(expected));

  test.each([
    ['emc/verdict.ts', 'format/quantities.ts', false],
    ['components/chart.tsx', 'auth/permissions.ts', true],
    ['components/chart.tsx', 'auth/session.ts', false],
    ['models/sweep.ts', 'emc/types.ts', true],
    ['models/sweep.ts', 'emc/verdict.ts', false],
    ['ops/server.ts', 'config/env.ts', true],
    ['outbox/main.ts', 'app/page.tsx', false],
    ['services/sweeps.ts', 'http/handle.ts', false],
    ['app/page.tsx', 'models/user.ts', false],
    ['attic/box.ts', 'emc/units.ts', false],
  ])('%s -> %s: %s', (from, to, allowed) => expect(edgeAllowed(from, to)).toBe(allowed));

  test('finds a cycle', () => {
    expect(
      findCycle(
        new Map([
          ['a', ['b']],
          ['b', ['c']],
          ['c', ['b']],
        ]),
      ),
    ).toEqual(['b', 'c', 'b']);
    expect(
      findCycle(
        new Map([
          ['a', ['b', 'c']],
          ['b', ['c']],
          ['c', []],
        ]),
      ),
    ).toBeNull();
  });
});
