'use strict';

/*
 * npm run stillfield -- <command> [arguments]: runs src/ops/commands/<name>.ts with the environment npm start uses
 * (token:issue is the file tokenIssue.ts). A private database is started when it does not run, and stopped again.
 */

const fs = require('node:fs');
const path = require('node:path');
const { runTypescript } = require('./children');
const { ROOT, checkNode, ensurePackages } = require('./nodePackages');
const { Refusal, run } = require('./say');
const { STATE, openDatabase } = require('./settings');

const DIRECTORY = path.join(ROOT, 'src/ops/commands');

/** `tokenIssue.ts` is typed `token:issue`. */
const commandOf = (file) => file.replace(/\.ts$/, '').replace(/[A-Z]/g, (letter) => `:${letter.toLowerCase()}`);
const fileOf = (command) => `${command.replace(/:([a-z])/g, (_, letter) => letter.toUpperCase())}.ts`;

run(async () => {
  const [command, ...args] = process.argv.slice(2);
  const known = fs.existsSync(DIRECTORY) ? fs.readdirSync(DIRECTORY).filter((name) => name.endsWith('.ts')) : [];
  if (!command || !known.includes(fileOf(command))) {
    const list = known.map(commandOf).sort().join(', ') || 'none yet';
    throw new Refusal(`Usage: npm run stillfield -- <command>; the commands are: ${list}`);
  }
  checkNode();
  ensurePackages(ROOT, console.error);
  const database = await openDatabase({ tell: () => {} });
  const environment = { ...database.environment, NODE_ENV: 'production', STILLFIELD_STATE: STATE };
  const code = await runTypescript(`src/ops/commands/${fileOf(command)}`, args, environment);
  await database.stop();
  process.exit(code ?? 1);
});
