'use strict';

/*
 * npm test: everything that is checked, from a clean clone, in a database and a build of its own (.stillfield-test), so
 * that a running lab is never touched.
 *
 *   npm test                        everything
 *   npm test -- core                one project of jest.config.js (core, http, browser)
 *   npm test -- http tests/outbox   and only the files whose path matches
 */

const { spawn, spawnSync } = require('node:child_process');
const fs = require('node:fs');
const os = require('node:os');
const path = require('node:path');
const { buildIsFresh, hashInputs, noteBuild } = require('./buildInputs');
const { installPackages } = require('./debianPackages');
const { ROOT, checkNode, ensurePackages } = require('./nodePackages');
const { findProgram } = require('./privateDatabase');
const { Refusal, run, say } = require('./say');
const { STATE, startTestDatabase } = require('./testDatabase');

const PROJECTS = ['core', 'http', 'browser'];
const DIST = '.stillfield-test/next';
const PROJECT_LIMIT_MS = 15 * 60_000;
/** After its results are written jest only waits for what a test left open. */
const LINGER_LIMIT_MS = 20_000;

/** Nothing of a lab's own services reaches a test. */
const LAB_VARIABLES = /^(DATABASE_|SMTP_|SESSION_SECRET|APP_ORIGIN|TRUSTED_PROXIES|STILLFIELD_|PORT$|HOST$|NODE_ENV$)/;

/** This process's environment without a lab's settings, with what is given. */
function cleanEnvironment(extra) {
  const kept = Object.entries(process.env).filter(([name]) => !LAB_VARIABLES.test(name));
  return { ...Object.fromEntries(kept), NEXT_DIST_DIR: DIST, NEXT_TELEMETRY_DISABLED: '1', ...extra };
}

const tool = (file) => path.join(ROOT, 'node_modules', file);
/** The jest that runs now, for a signal to end with us. */
let jest = null;
const total = { passed: 0, failed: 0, skipped: 0 };

/** Runs one tool; its words are shown only when it fails, and a failure counts as one. */
function check(name, args, extra = {}) {
  const begun = Date.now();
  const result = spawnSync(process.execPath, args, {
    cwd: ROOT,
    encoding: 'utf8',
    env: cleanEnvironment(extra),
    maxBuffer: 64 * 1024 * 1024,
  });
  const good = result.status === 0;
  if (!good) {
    console.log(`${result.stdout}${result.stderr}`);
    total.failed += 1;
  }
  say(`${name} ${good ? 'ok' : 'FAILED'} (${((Date.now() - begun) / 1000).toFixed(1)} s)`);
  return good;
}

/** Runs jest on one project and adds up what it reports. */
async function runProject(project, paths, extra) {
  const begun = Date.now();
  const report = path.join(os.tmpdir(), `stillfield-jest-${process.pid}-${project}.json`);
  const args = [tool('jest/bin/jest.js'), '--selectProjects', project, '--json', `--outputFile=${report}`];
  const child = spawn(process.execPath, [...args, '--passWithNoTests', ...paths], {
    cwd: ROOT,
    env: cleanEnvironment(extra),
    // the report goes to the file; what jest tells a reader comes on standard error
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  jest = child;
  let overtime = null;
  let reportedAt = null;
  const watch = setInterval(() => {
    if (reportedAt === null && fs.existsSync(report)) reportedAt = Date.now();
    if (Date.now() - begun > PROJECT_LIMIT_MS) overtime = `ran longer than ${PROJECT_LIMIT_MS / 60_000} minutes`;
    if (reportedAt !== null && Date.now() - reportedAt > LINGER_LIMIT_MS)
      overtime = 'left a socket, timer or process open';
    if (overtime) child.kill('SIGKILL');
  }, 500);
  const code = await new Promise((resolve) => child.once('exit', resolve));
  clearInterval(watch);

  const seconds = ((Date.now() - begun) / 1000).toFixed(1);
  if (!fs.existsSync(report)) {
    total.failed += 1;
    say(`${project} FAILED: ${overtime ?? 'jest gave no report'} (${seconds} s)`);
    return;
  }
  const result = JSON.parse(fs.readFileSync(report, 'utf8'));
  fs.rmSync(report);
  const failed = result.numFailedTests + result.numRuntimeErrorTestSuites;
  const skipped = result.numPendingTests + result.numTodoTests;
  total.passed += result.numPassedTests;
  total.skipped += skipped;
  total.failed += failed || (code !== 0 || overtime ? 1 : 0);
  const note = overtime ? `, ${overtime}` : '';
  say(`${project}: ${result.numPassedTests} passed, ${failed} failed, ${skipped} skipped${note} (${seconds} s)`);
}

/** The tsconfig that Next may rewrite as it likes: see next.config.js. */
function writeTsconfig() {
  fs.mkdirSync(STATE, { recursive: true });
  fs.writeFileSync(path.join(ROOT, `${DIST}.tsconfig.json`), '{ "extends": "../tsconfig.json" }\n');
}

/** Builds the pages for the tests when their sources have changed. */
function build() {
  const stamp = path.join(STATE, 'build.sha256');
  if (buildIsFresh(ROOT, DIST, stamp)) {
    say('the build is the one of these sources');
    return;
  }
  fs.rmSync(stamp, { force: true });
  const hash = hashInputs(ROOT);
  if (check('build', [tool('next/dist/bin/next'), 'build'], { NODE_ENV: 'production' })) noteBuild(stamp, hash);
}

/** Lint, format and types. */
function checkSources() {
  check('lint', [tool('eslint/bin/eslint.js'), '--max-warnings', '0', '.']);
  check('format', [tool('prettier/bin/prettier.cjs'), '--check', '--log-level', 'warn', '.']);
  // a clean clone has no next-env.d.ts and no route types yet
  check('route types', [tool('next/dist/bin/next'), 'typegen']);
  check('types', [tool('typescript/bin/tsc'), '--noEmit']);
}

/** True when tests/browser holds a test. */
const hasBrowserTests = () =>
  fs.existsSync(path.join(ROOT, 'tests/browser')) &&
  fs.readdirSync(path.join(ROOT, 'tests/browser')).some((name) => /\.test\.tsx?$/.test(name));

function ensureChromium() {
  if (process.env.CHROMIUM_PATH || findProgram('chromium', 'chromium-browser', 'google-chrome')) return;
  installPackages(['chromium'], 'set CHROMIUM_PATH, or run "npm test -- core" and "npm test -- http" alone', say);
}

run(async () => {
  const [first, ...paths] = process.argv.slice(2);
  if (first && !PROJECTS.includes(first)) throw new Refusal(`Usage: npm test [-- ${PROJECTS.join('|')} [path…]]`);
  const wanted = (first ? [first] : PROJECTS).filter((name) => name !== 'browser' || hasBrowserTests());
  checkNode();
  ensurePackages();
  if (wanted.includes('browser')) ensureChromium();

  let database = null;
  const stop = async (code) => {
    jest?.kill('SIGKILL');
    await database?.stop();
    process.exit(code);
  };
  for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => void stop(1));

  writeTsconfig();
  if (!first) checkSources();
  if (wanted.includes('core')) await runProject('core', paths, {});
  if (wanted.some((name) => name !== 'core')) {
    database = await startTestDatabase({ tell: say });
    const extra = {
      STILLFIELD_TEST_DATABASE_URL: database.databaseUrl,
      STILLFIELD_TEST_MIGRATE_URL: database.migrateUrl,
    };
    build();
    for (const project of wanted.filter((name) => name !== 'core')) await runProject(project, paths, extra);
  }
  if (!first && !hasBrowserTests()) say('there is no browser test yet');
  await database?.stop();
  console.log(`${total.passed} passed, ${total.failed} failed, ${total.skipped} skipped`);
  process.exit(total.failed > 0 || total.passed === 0 ? 1 : 0);
});
