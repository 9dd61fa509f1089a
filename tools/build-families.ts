/**
 * Builds the family files that derive from the stars, and the manifest of all:
 *
 *   npx tsx tools/build-families.ts --lines FILE [--folder DIR]
 *
 * Reads DIR/stars.fits (made by tools/build-stars.ts from the same list) and FILE, a list of atomic lines;
 * writes DIR/populations.fits, DIR/quasars.fits and DIR/manifest.json. DIR is templates/families by default.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { writeDerivedFamilies } from '../cli/derived-families.ts';

const { values } = parseArgs({
  options: {
    lines: { type: 'string' },
    folder: { type: 'string', default: fileURLToPath(new URL('../templates/families/', import.meta.url)) },
  },
});
if (values.lines === undefined) throw new Error('--lines FILE must be given');
const stars = new Uint8Array(readFileSync(join(values.folder, 'stars.fits')));
for (const line of writeDerivedFamilies(values.folder, stars, values.lines)) console.log(line);
