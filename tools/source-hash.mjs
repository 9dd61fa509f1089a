import { createHash } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

/** The folders a build is made from. `tsconfig.build.json` lists the same ones. */
export const SOURCE_FOLDERS = [
  'config',
  'templates',
  'pipeline',
  'simulate',
  'store',
  'worker',
  'report',
  'cli',
];

/** Files beside those folders that change what a build makes. */
const BUILD_FILES = ['package-lock.json', 'tsconfig.json', 'tsconfig.build.json', 'tools/build.mjs'];

/**
 * Every file under a folder, in code-unit order, with `/` between parts on every platform.
 *
 * @param {string} root folder the names are relative to
 * @param {string} folder folder below `root`
 * @returns {string[]} names relative to `root`; empty when the folder does not exist
 */
export function filesUnder(root, folder) {
  const found = [];
  const pending = [folder];
  while (pending.length > 0) {
    const current = pending.pop();
    let entries;
    try {
      entries = readdirSync(join(root, current), { withFileTypes: true });
    } catch (error) {
      if (error.code === 'ENOENT') continue;
      throw error;
    }
    for (const entry of entries) {
      const name = `${current}/${entry.name}`;
      if (entry.isDirectory()) pending.push(name);
      else if (entry.isFile()) found.push(name);
    }
  }
  return found.sort();
}

/**
 * One hash of everything a build depends on: names and contents.
 *
 * @param {string} root the project's root
 * @returns {string} sha256, hexadecimal
 */
export function sourceHash(root) {
  const hash = createHash('sha256');
  const names = [...BUILD_FILES, ...SOURCE_FOLDERS.flatMap((folder) => filesUnder(root, folder))];
  for (const name of names) {
    const content = createHash('sha256')
      .update(readFileSync(join(root, name)))
      .digest('hex');
    hash.update(`${name}\n${content}\n`);
  }
  return hash.digest('hex');
}
