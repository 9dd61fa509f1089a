import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { seededRandom } from '../../pipeline/core/random.ts';
import { encodeFits } from '../../pipeline/encode/index.ts';

/** Rows of each practice file; more than one chunk of 7, fewer than one of 240. */
export const ROWS_PER_FILE = 12;
/** Enough for the noise check of an exposure to tell something. */
const PIXELS = 800;
/** The last rows of each file look at the sky, enough of them to tell the exposure's noise. */
const SKY_ROWS = 4;

/** A flux level that makes the stand-in measurement misbehave (see stand-in-task.ts). */
export const NEVER_ENDS = 6_660;
export const ENDS_ITS_THREAD = 6_661;
export const THROWS = 6_662;
/** A flux level whose pixels all carry no weight, so that the row cannot be read. */
export const BLIND = 6_663;

/** A new empty folder of this test's own. */
export function freshFolder(name: string): string {
  return mkdtempSync(join(tmpdir(), `shiftwork-${name}-`));
}

/** A row-stacked exposure: flux, inverse variance and a table of fibres; row i has the mean flux `levels[i]`. */
export function exposureFile(name: string, levels: readonly number[], seed: number): Uint8Array {
  const random = seededRandom(seed);
  const rows = levels.length;
  const flux = Float32Array.from({ length: rows * PIXELS }, (_, i) => {
    const level = levels[Math.floor(i / PIXELS)]!;
    // Bad rows must be known by their mean exactly; good ones carry noise.
    return level >= NEVER_ENDS ? level : level + random.normal();
  });
  const weights = Float32Array.from({ length: rows * PIXELS }, (_, i) =>
    levels[Math.floor(i / PIXELS)] === BLIND ? 0 : 1,
  );
  const axes = [PIXELS, rows];
  const cards = [
    { keyword: 'CTYPE1', value: 'WAVE' },
    { keyword: 'CUNIT1', value: 'Angstrom' },
    { keyword: 'CRPIX1', value: 1 },
    { keyword: 'CRVAL1', value: 5_000 },
    { keyword: 'CDELT1', value: 2 },
    { keyword: 'SPECSYS', value: 'BARYCENT' },
  ];
  const names = levels.map((_, i) => (i < rows - SKY_ROWS ? `${name}-target-${i}` : `${name}-sky-${i}`));
  return encodeFits([
    { type: 'image', axes: [] },
    { type: 'image', name: 'FLUX', axes, pixels: flux, unit: 'erg/s/cm2/Angstrom', cards },
    { type: 'image', name: 'IVAR', axes, pixels: weights, cards },
    {
      type: 'table',
      name: 'FIBRES',
      rowCount: rows,
      columns: [
        { name: 'FIBRE', type: 'int32', values: levels.map((_, i) => i) },
        { name: 'TARGET', type: 'string', values: names },
        {
          name: 'ROLE',
          type: 'string',
          values: levels.map((_, i) => (i < rows - SKY_ROWS ? 'target' : 'sky')),
        },
      ],
    },
  ]);
}

/** Two exposures and a single spectrum: 25 spectra of ordinary behaviour. */
export function practiceFolder(): string {
  const folder = join(freshFolder('night'), '2031-04-02');
  mkdirSync(folder);
  for (const [i, name] of ['early', 'late'].entries()) {
    const levels = Array.from({ length: ROWS_PER_FILE }, (_, row) =>
      row < ROWS_PER_FILE - SKY_ROWS ? 100 + 10 * row + i : 0,
    );
    writeFileSync(join(folder, `${name}.fits`), exposureFile(name, levels, 11 + i));
  }
  const text = Array.from({ length: PIXELS }, (_, i) => `${5_000 + 2 * i} ${200 + (i % 3)} 1.0`);
  writeFileSync(join(folder, 'single.txt'), `# wavelength flux error\n${text.join('\n')}\n`);
  return folder;
}
