'use strict';

/* Starts the TypeScript entry points as children and stops them again. Node built-ins only. */

const { spawn } = require('node:child_process');
const path = require('node:path');
const { ROOT } = require('./nodePackages');

/**
 * Runs a TypeScript file through tsx in a process of its own. The child stands in its own process group, so a Ctrl-C in
 * the terminal reaches only the parent, which then drains the children in order; a channel tells it when the parent dies.
 *
 * @param {string} file relative to the project root
 * @param {string[]} args
 * @param {NodeJS.ProcessEnv} env
 * @param {import('node:child_process').StdioOptions} [stdio]
 */
function startTypescript(file, args, env, stdio = ['ignore', 'inherit', 'inherit', 'ipc']) {
  return spawn(process.execPath, ['--import', 'tsx', path.join(ROOT, file), ...args], {
    cwd: ROOT,
    env,
    stdio,
    detached: true,
  });
}

/** Resolves to the exit code of a child (null when a signal ended it). */
function ended(child) {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve(child.exitCode);
  return new Promise((resolve) => {
    child.once('exit', resolve);
    child.once('error', () => resolve(1));
  });
}

/** Asks a child to drain, kills it after the limit, and waits for its end. */
async function stopChild(child, limitMilliseconds) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  child.kill('SIGTERM');
  const limit = setTimeout(() => child.kill('SIGKILL'), limitMilliseconds);
  await ended(child);
  clearTimeout(limit);
}

/** Runs a TypeScript file in the foreground; resolves to its exit code. */
function runTypescript(file, args, env, stdio = 'inherit') {
  const child = spawn(process.execPath, ['--import', 'tsx', path.join(ROOT, file), ...args], { cwd: ROOT, env, stdio });
  return ended(child);
}

module.exports = { ended, runTypescript, startTypescript, stopChild };
