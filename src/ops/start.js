'use strict';

/*
 * npm start: from a clean clone to a lab that answers, and every time after that. Each step looks first whether it is
 * done already. `--dev` compiles pages as they are asked for instead of building them.
 */

const { spawnSync } = require('node:child_process');
const fs = require('node:fs');
const net = require('node:net');
const path = require('node:path');
const { buildIsFresh, hashInputs, noteBuild } = require('./buildInputs');
const { ended, runTypescript, startTypescript, stopChild } = require('./children');
const { ROOT, checkNode, ensurePackages } = require('./nodePackages');
const { Refusal, run, say } = require('./say');
const { STATE, given, openDatabase } = require('./settings');

const READY_LIMIT_MS = 60_000;
/** Longer than the children's own draining. */
const STOP_LIMIT_MS = 25_000;

/** Refuses a port that somebody listens on, before anything is started. */
function checkPort(host, port) {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', (error) => {
      const taken = `Port ${port} on ${host} is taken: stop what listens there, or set PORT to another one.`;
      const other = `Cannot listen on ${host} port ${port} (${error.code}): set HOST and PORT to an address of this machine.`;
      reject(new Refusal(error.code === 'EADDRINUSE' ? taken : other));
    });
    probe.listen({ host, port, exclusive: true }, () => probe.close(resolve));
  });
}

/** Migrates and applies the rights when the owner's account is known. */
async function bringUpToDate({ migrateUrl, databaseUrl, hosts }) {
  if (!migrateUrl) {
    say('no DATABASE_MIGRATE_URL: migrations and rights are left as they are');
    return;
  }
  const { migrate } = require('./migrate');
  const { migrated, tables } = await migrate({ migrateUrl, databaseUrl, hosts });
  if (!migrated) say(`the schema is up to date (${tables} tables)`);
}

/** Fills an empty database with the demo lab when the demo is wanted. */
async function seedDemo({ environment, migrateUrl }) {
  if (environment.STILLFIELD_DEMO !== '1' || !migrateUrl || !fs.existsSync(path.join(ROOT, 'src/ops/seed.ts'))) return;
  const { openConnection } = require('../config/database');
  const connection = await openConnection(migrateUrl);
  const [{ users }] = await connection.query('SELECT COUNT(*) AS users FROM users').finally(() => connection.end());
  if (Number(users) > 0) return;
  say('filling the demo lab');
  const code = await runTypescript('src/ops/seed.ts', [], { ...environment, STILLFIELD_STATE: STATE });
  if (code !== 0)
    throw new Refusal('The demo lab could not be filled; its words are above. STILLFIELD_DEMO=0 leaves it out.');
}

/** Builds the pages when their sources have changed since the last build. */
function build(environment) {
  const dist = environment.NEXT_DIST_DIR || '.next';
  const stamp = path.join(STATE, 'build.sha256');
  if (buildIsFresh(ROOT, dist, stamp)) return;
  say('building the pages (up to a minute)');
  const hash = hashInputs(ROOT);
  const built = spawnSync(process.execPath, [path.join(ROOT, 'node_modules/next/dist/bin/next'), 'build'], {
    cwd: ROOT,
    encoding: 'utf8',
    env: { ...environment, NODE_ENV: 'production' },
  });
  if (built.status !== 0) {
    fs.writeFileSync(path.join(STATE, 'build.log'), `${built.stdout}${built.stderr}`);
    throw new Refusal('The pages could not be built; the words of next build are in .stillfield/build.log.');
  }
  fs.mkdirSync(STATE, { recursive: true });
  noteBuild(stamp, hash);
}

/** Polls /api/ready until it answers 200; null when the web process ended or the time is up. */
async function waitUntilReady(web, host, port) {
  const reachable =
    host === '0.0.0.0' ? '127.0.0.1' : host === '::' ? '[::1]' : host.includes(':') ? `[${host}]` : host;
  const until = Date.now() + READY_LIMIT_MS;
  let last = 'no answer';
  while (web.exitCode === null && web.signalCode === null) {
    try {
      const answer = await fetch(`http://${reachable}:${port}/api/ready`, { signal: AbortSignal.timeout(5000) });
      if (answer.ok) return;
      last = `${answer.status} ${(await answer.text()).slice(0, 200)}`;
    } catch (error) {
      last = error.cause?.code ?? error.name;
    }
    if (Date.now() > until)
      throw new Refusal(`/api/ready does not answer ready after 60 s (${last}); see the log above.`);
    await new Promise((resolve) => setTimeout(resolve, 150));
  }
  throw new Refusal('The web process ended before it was ready; its words are above.');
}

/** A port of 127.0.0.1 that nobody listens on at this moment. */
function freePort() {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', reject);
    probe.listen({ host: '127.0.0.1', port: 0 }, () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

/**
 * In the demo without a mail server, where the outbox finds the catcher of this machine: the same port for both, chosen
 * here so that a catcher started again is found again. Otherwise e-mail goes to SMTP_URL, or waits.
 */
async function chooseCatcher(environment) {
  delete environment.MAIL_CATCHER_PORT;
  if (environment.STILLFIELD_DEMO === '1' && !given('SMTP_URL'))
    environment.MAIL_CATCHER_PORT = String(await freePort());
}

/** Starts a process beside the web process and starts it again when it ends by itself, with a growing pause. */
function keepRunning(name, file, environment, isStopping) {
  const kept = { child: null };
  const start = (pauseMs) => {
    const begun = Date.now();
    kept.child = startTypescript(file, [], environment);
    void ended(kept.child).then((code) => {
      if (isStopping()) return;
      say(`the ${name} process ended (${code}); starting it again`);
      const pause = Date.now() - begun > 60_000 ? 1000 : pauseMs;
      setTimeout(() => !isStopping() && start(Math.min(pause * 2, 30_000)), pause).unref();
    });
  };
  start(1000);
  return kept;
}

async function main() {
  const dev = process.argv.includes('--dev');
  checkNode();
  ensurePackages();
  const host = process.env.HOST || '127.0.0.1';
  const port = Number(process.env.PORT || 3000);
  if (Number.isInteger(port) && port > 0 && port < 65536) await checkPort(host, port);

  let stopping = false;
  let web = null;
  let outbox = null;
  let catcher = null;
  let database = null;
  const stopAll = async () => {
    stopping = true;
    await Promise.all([web, outbox?.child].filter(Boolean).map((child) => stopChild(child, STOP_LIMIT_MS)));
    // last, so that what the outbox still sends is caught
    if (catcher) await stopChild(catcher.child, STOP_LIMIT_MS);
    await database?.stop();
  };
  const onSignal = (signal) => {
    if (stopping) return;
    say(`${signal}: finishing what is in flight`);
    stopAll().then(
      () => {
        say('stopped');
        process.exit(0);
      },
      (error) => {
        console.error(error);
        process.exit(1);
      },
    );
  };
  process.on('SIGINT', onSignal);
  process.on('SIGTERM', onSignal);
  process.on('SIGHUP', onSignal);

  try {
    database = await openDatabase();
    await bringUpToDate(database);
    await seedDemo(database);
    if (!dev) build(database.environment);
    if (stopping) return;
    const environment = { ...database.environment, NODE_ENV: dev ? 'development' : 'production' };
    // the owner of the schema is for migrations; the processes that serve never hold it
    delete environment.DATABASE_MIGRATE_URL;
    delete environment.DATABASE_MIGRATE_URL_FILE;
    await chooseCatcher(environment);
    if (environment.MAIL_CATCHER_PORT) {
      catcher = keepRunning('mail catcher', 'src/ops/mailCatcher.ts', environment, () => stopping);
    }
    web = startTypescript('src/ops/server.ts', dev ? ['--dev'] : [], environment);
    outbox = keepRunning('outbox', 'src/outbox/main.ts', environment, () => stopping);
    await waitUntilReady(web, host, port);
    const signIns = path.join(STATE, 'demo-sign-ins.txt');
    say(`Stillfield answers at ${environment.APP_ORIGIN || `http://localhost:${port}`}`);
    if (environment.STILLFIELD_DEMO === '1' && fs.existsSync(signIns)) {
      console.log(`\n${fs.readFileSync(signIns, 'utf8').trimEnd()}\n`);
    }
  } catch (error) {
    if (stopping) return;
    await stopAll();
    throw error;
  }
  const code = await ended(web);
  if (stopping) return;
  say(`the web process ended (${code})`);
  await stopAll();
  process.exit(1);
}

if (require.main === module) run(main);

module.exports = { checkPort, chooseCatcher, keepRunning };
