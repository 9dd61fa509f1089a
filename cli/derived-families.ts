import { readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { buildPopulations, buildQuasars, manifestOf } from '../templates/index.ts';

/** What a manifest calls the line list, whatever its file is called. */
export const LINE_LIST = 'lines';

/**
 * Builds populations and quasars from stars and a line list and writes them with their manifest.
 *
 * @param folder existing folder; `stars.fits` is not written
 * @param stars bytes of the star family file that lies (or will lie) beside them
 * @param linesFile path of the line list
 * @returns one line per file written: name, bytes, sha256
 */
export function writeDerivedFamilies(folder: string, stars: Uint8Array, linesFile: string): string[] {
  const lines = new Uint8Array(readFileSync(linesFile));
  const files = {
    'stars.fits': stars,
    'populations.fits': buildPopulations(stars),
    'quasars.fits': buildQuasars(new TextDecoder().decode(lines)),
  };
  const manifest = manifestOf(files, { [LINE_LIST]: lines });
  replaceFile(join(folder, 'populations.fits'), files['populations.fits']);
  replaceFile(join(folder, 'quasars.fits'), files['quasars.fits']);
  replaceFile(join(folder, 'manifest.json'), `${JSON.stringify(manifest, null, 2)}\n`);
  return Object.entries(manifest.files).map(
    ([name, { bytes, sha256 }]) => `${name.padEnd(17)} ${String(bytes).padStart(9)} bytes  sha256 ${sha256}`,
  );
}

/** Writes beside and renames, so that a reader never sees half a file. */
export function replaceFile(path: string, content: Uint8Array | string): void {
  writeFileSync(`${path}.part`, content);
  renameSync(`${path}.part`, path);
}
