import { copyFileSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The root of the project under test. */
export const ROOT = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

const SETTINGS = [
  'package.json',
  'tsconfig.json',
  'biome.json',
  'eslint.config.mjs',
  '.dependency-cruiser.cjs',
  '.gitignore',
];

/**
 * A folder outside the tree with this project's settings and the given files, for planting faults in.
 *
 * @param files name relative to the folder → content
 * @param packages `linked`: the project's own node_modules; else names of empty packages to make
 * @returns the folder; the caller removes it with `removeProject`
 */
export function temporaryProject(
  files: Readonly<Record<string, string>>,
  packages: 'linked' | readonly string[],
): string {
  const folder = mkdtempSync(join(tmpdir(), 'shiftwork-planted-'));
  for (const name of SETTINGS) copyFileSync(join(ROOT, name), join(folder, name));
  for (const [name, content] of Object.entries(files)) write(folder, name, content);
  if (packages === 'linked') symlinkSync(join(ROOT, 'node_modules'), join(folder, 'node_modules'));
  else {
    for (const name of packages) {
      const place = `node_modules/${name}`;
      write(folder, `${place}/package.json`, JSON.stringify({ name, version: '1.0.0', main: 'index.js' }));
      write(folder, `${place}/index.js`, 'module.exports = {};\n');
    }
  }
  return folder;
}

export function removeProject(folder: string): void {
  rmSync(folder, { recursive: true, force: true });
}

function write(folder: string, name: string, content: string): void {
  mkdirSync(dirname(join(folder, name)), { recursive: true });
  writeFileSync(join(folder, name), content);
}
