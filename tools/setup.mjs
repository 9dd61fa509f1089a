/**
 * Makes a bare clone ready: installs packages and builds, each only when something it depends on changed.
 * npm runs this before `npm start` and `npm test`, so it uses nothing but what Node itself brings.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { takeLock } from './setup-lock.mjs';
import { sourceHash } from './source-hash.mjs';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const INSTALLED = join(ROOT, 'node_modules/.shiftwork-installed');
const BUILT = join(ROOT, 'dist/.built');

const release = takeLock(join(ROOT, '.setup-lock'), (owner) => {
  say(`another set-up (process ${owner}) is at work in this folder; waiting for it`);
});
let failed = null;
try {
  failed = install() ?? build();
} finally {
  release();
}
if (failed !== null) {
  console.error(`set-up: ${failed}`);
  process.exit(1);
}

/** @returns {string | null} what went wrong */
function install() {
  const wanted = createHash('sha256')
    .update(readFileSync(join(ROOT, 'package-lock.json')))
    .update(`${process.version} ${process.platform} ${process.arch}`)
    .digest('hex');
  if (recorded(INSTALLED) === wanted) return null;
  say('installing the packages of package-lock.json (about half a minute)');
  // --include=dev: with NODE_ENV=production npm would leave out the compiler.
  const status = run(...npm(), 'ci', '--include=dev');
  if (status !== 0) return `npm ci ended with status ${status}; nothing was built`;
  writeFileSync(INSTALLED, `${wanted}\n`);
  return null;
}

/** @returns {string | null} what went wrong */
function build() {
  if (recorded(BUILT) === sourceHash(ROOT)) return null;
  say('building (the sources changed since the last build)');
  const status = run(process.execPath, join(ROOT, 'tools/build.mjs'));
  return status === 0 ? null : `the build ended with status ${status}`;
}

/** The npm that runs this script, so that both are the same version; else the one on the path. */
function npm() {
  const own = process.env.npm_execpath;
  return own === undefined ? ['npm'] : [process.execPath, own];
}

function run(command, ...parameters) {
  const child = spawnSync(command, parameters, { cwd: ROOT, stdio: 'inherit' });
  return child.error === undefined ? (child.status ?? child.signal) : child.error.message;
}

function recorded(marker) {
  return existsSync(marker) ? readFileSync(marker, 'utf8').trim() : null;
}

function say(what) {
  console.log(`set-up: ${what}`);
}
