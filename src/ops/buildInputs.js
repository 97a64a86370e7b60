'use strict';

/* Is the build on disk the build of these sources? Node built-ins only. */

const crypto = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');

/** What `next build` reads. */
const INPUTS = [
  'src',
  'public',
  'fixtures',
  'package-lock.json',
  'next.config.js',
  'postcss.config.mjs',
  'tsconfig.json',
];
/** Processes of their own that no page imports. */
const NOT_BUILT = ['src/ops', 'src/outbox'];

/** Every file below a path, relative to root, sorted; links are not followed. */
function filesBelow(root, relative) {
  const absolute = path.join(root, relative);
  if (!fs.existsSync(absolute) || NOT_BUILT.includes(relative)) return [];
  if (!fs.lstatSync(absolute).isDirectory()) return [relative];
  return fs
    .readdirSync(absolute)
    .sort()
    .flatMap((name) => filesBelow(root, `${relative}/${name}`));
}

/**
 * SHA-256 over the names and bytes of everything a build reads, and the Node that built it.
 * @param {string} root project root
 * @returns {string} hexadecimal
 */
function hashInputs(root) {
  const hash = crypto.createHash('sha256').update(process.version);
  for (const file of INPUTS.flatMap((input) => filesBelow(root, input))) {
    const bytes = fs.readFileSync(path.join(root, file));
    hash.update(`\0${file}\0${bytes.length}\0`).update(bytes);
  }
  return hash.digest('hex');
}

/**
 * @param {string} root project root
 * @param {string} distDirectory where the build is, relative to root
 * @param {string} stampFile file that `noteBuild` wrote
 * @returns {boolean} true when the build there was made from what is on disk now
 */
function buildIsFresh(root, distDirectory, stampFile) {
  if (!fs.existsSync(path.join(root, distDirectory, 'BUILD_ID')) || !fs.existsSync(stampFile)) return false;
  return fs.readFileSync(stampFile, 'utf8') === hashInputs(root);
}

/** Notes that the build on disk is the one of this hash (taken before building, so that later edits count as changes). */
function noteBuild(stampFile, hash) {
  fs.writeFileSync(stampFile, hash);
}

module.exports = { buildIsFresh, hashInputs, noteBuild };
