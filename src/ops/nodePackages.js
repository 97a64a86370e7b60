'use strict';

/* Installs node_modules when they are missing or older than the lock file. Node built-ins only. */

const { spawnSync } = require('node:child_process');
const crypto = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');
const { Refusal, say } = require('./say');

const ROOT = path.resolve(__dirname, '../..');
const OLDEST_NODE = 20;

/** Refuses a Node that is too old for the packages. */
function checkNode() {
  const major = Number(process.versions.node.split('.')[0]);
  if (major < OLDEST_NODE) {
    throw new Refusal(`Node ${process.versions.node} is too old: install Node ${OLDEST_NODE} or newer.`);
  }
}

/** True when node_modules holds what the lock file asks for: the same hash as at the last install, or a newer install. */
function packagesAreFresh(root) {
  const installed = path.join(root, 'node_modules/.package-lock.json');
  const lock = path.join(root, 'package-lock.json');
  const stamp = path.join(root, 'node_modules/.stillfield-lock');
  if (!fs.existsSync(installed)) return false;
  if (fs.existsSync(stamp)) return fs.readFileSync(stamp, 'utf8') === hashOf(lock);
  return fs.statSync(installed).mtimeMs >= fs.statSync(lock).mtimeMs;
}

const hashOf = (file) => crypto.createHash('sha256').update(fs.readFileSync(file)).digest('hex');

/**
 * Makes node_modules agree with package-lock.json.
 * @throws {Refusal} in one line when npm cannot do it
 */
function ensurePackages(root = ROOT, tell = say) {
  if (packagesAreFresh(root)) return;
  const missing = !fs.existsSync(path.join(root, 'node_modules/.package-lock.json'));
  tell(missing ? 'installing the Node packages (about a minute)' : 'bringing the Node packages up to date');
  const npm = spawnSync('npm', [missing ? 'ci' : 'install', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
    encoding: 'utf8',
    env: { ...process.env, NODE_ENV: 'development' },
  });
  if (npm.status !== 0) {
    const reason = (npm.stderr ?? npm.error?.message ?? '').split('\n').find((line) => /npm error/i.test(line));
    throw new Refusal(`npm could not install the packages (${reason ?? 'see npm'}): check the network, then "npm ci".`);
  }
  fs.writeFileSync(path.join(root, 'node_modules/.stillfield-lock'), hashOf(path.join(root, 'package-lock.json')));
}

module.exports = { ROOT, checkNode, ensurePackages, packagesAreFresh };
