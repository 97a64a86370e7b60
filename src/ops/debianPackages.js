'use strict';

/* Installs Debian packages where that is possible. Node built-ins only. */

const { spawnSync } = require('node:child_process');
const fs = require('node:fs');
const { Refusal } = require('./say');

/**
 * apt-get update and install; as root, or through sudo where it asks for no password.
 *
 * @param {string[]} packages
 * @param {string} otherwise what the reader can do instead, ends the one-line refusal
 * @param {(text: string) => void} tell
 * @throws {Refusal} in one line when this is no Debian, there are no rights, or apt-get fails
 */
function installPackages(packages, otherwise, tell) {
  const names = packages.join(' ');
  if (!fs.existsSync('/usr/bin/apt-get')) {
    throw new Refusal(`${names} is missing and there is no apt-get here: install it, or ${otherwise}.`);
  }
  const root = process.getuid() === 0;
  if (!root && spawnSync('sudo', ['-n', 'true']).status !== 0) {
    throw new Refusal(`No rights to install ${names}: run "sudo apt-get install ${names}" once, or ${otherwise}.`);
  }
  const apt = (...args) => {
    const command = ['apt-get', '-o', 'DPkg::Lock::Timeout=500', '-qq', ...args];
    const [program, ...rest] = root ? command : ['sudo', '-n', 'DEBIAN_FRONTEND=noninteractive', ...command];
    return spawnSync(program, rest, {
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'pipe'],
    });
  };
  tell(`installing ${names} (Debian packages; about half a minute)`);
  apt('update');
  const installed = apt('install', '-y', '--no-install-recommends', ...packages);
  if (installed.status !== 0) {
    const reason = (installed.stderr || '').trim().split('\n').at(-1);
    throw new Refusal(`apt-get could not install ${names} (${reason}): install it yourself, or ${otherwise}.`);
  }
}

module.exports = { installPackages };
