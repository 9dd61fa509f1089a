import { POPULATIONS, populationSpectra } from './galaxies/population.ts';
import { populationsToFile, quasarsToFile, starsFromFile } from './prepare/file-contents.ts';
import { QUASAR_SEARCH_GRID } from './quasars/grid.ts';
import { ironBlend } from './quasars/iron.ts';
import { ironLinesOf } from './quasars/iron-lines.ts';
import { WINDOWS, windowVectors } from './quasars/windows.ts';

/**
 * `populations.fits` from the bytes of `stars.fits`: every recipe of `POPULATIONS`. A few seconds.
 *
 * @throws InputFault when the bytes are not a star family file
 */
export function buildPopulations(starsFile: Uint8Array): Uint8Array {
  const stars = starsFromFile(starsFile);
  const spectra = populationSpectra(stars);
  const populations = POPULATIONS.map(({ name, age }, k) => ({ name, age, flux: spectra[k]! }));
  return populationsToFile({ grid: stars.grid, populations });
}

/**
 * `quasars.fits` from the text of a line list (see `ironLinesOf`): iron blend and search vectors. About ten
 * seconds.
 *
 * @throws RangeError when the list is malformed or holds no line of Fe II
 */
export function buildQuasars(lineList: string): Uint8Array {
  const iron = ironBlend(ironLinesOf(lineList), QUASAR_SEARCH_GRID);
  const vectors = windowVectors(QUASAR_SEARCH_GRID, iron);
  return quasarsToFile({ iron, windows: WINDOWS.map((window, k) => ({ window, vectors: vectors[k]! })) });
}
