'use strict';

/*
 * npm run stillfield -- <command> [arguments]: runs src/ops/commands/<command>.ts with the environment npm start uses.
 * A private database is started when it does not run, and stopped again.
 */

const fs = require('node:fs');
const path = require('node:path');
const { runTypescript } = require('./children');
const { ROOT, checkNode, ensurePackages } = require('./nodePackages');
const { Refusal, run } = require('./say');
const { STATE, openDatabase } = require('./settings');

const DIRECTORY = path.join(ROOT, 'src/ops/commands');

/** Passwords are asked for or come through a pipe, so a command has its standard input. */
const STDIO = ['inherit', 'inherit', 'inherit', 'ipc'];

const fileOf = (command) => `${command}.ts`;

run(async () => {
  const [command, ...args] = process.argv.slice(2);
  const known = fs.existsSync(DIRECTORY) ? fs.readdirSync(DIRECTORY).filter((name) => name.endsWith('.ts')) : [];
  if (!command || !known.includes(fileOf(command))) {
    const list =
      known
        .map((name) => name.replace(/\.ts$/, ''))
        .sort()
        .join(', ') || 'none yet';
    throw new Refusal(`Usage: npm run stillfield -- <command>; the commands are: ${list}`);
  }
  checkNode();
  ensurePackages(ROOT, console.error);
  const database = await openDatabase({ tell: () => {} });
  const environment = { ...database.environment, NODE_ENV: 'production', STILLFIELD_STATE: STATE };
  const code = await runTypescript(`src/ops/commands/${fileOf(command)}`, args, environment, STDIO);
  await database.stop();
  process.exit(code ?? 1);
});
