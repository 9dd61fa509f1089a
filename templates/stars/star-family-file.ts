import { encodeSpectra } from '../prepare/spectra-file.ts';
import { STORED_GRID } from './stored-grid.ts';
import type { StoredStar } from './stored-star.ts';

/**
 * The star family as a FITS file: an image with one row per star on STORED_GRID, mean 1, and a table with its
 * name, group, parameters and `scale`, the mean surface flux density in erg s^-1 cm^-2 angstrom^-1.
 */
export function starFamilyFile(stars: readonly StoredStar[]): Uint8Array {
  const parameters = stars.map((star) => star.parameters);
  return encodeSpectra({
    grid: STORED_GRID,
    rows: stars.map((star) => star.flux),
    columns: [
      { name: 'name', type: 'string', values: parameters.map((p) => p.name) },
      { name: 'group', type: 'string', values: parameters.map((p) => p.group) },
      { name: 'teff', type: 'float64', unit: 'K', values: parameters.map((p) => p.effectiveTemperature) },
      { name: 'logg', type: 'float64', values: parameters.map((p) => p.logGravity) },
      { name: 'metallicity', type: 'float64', values: parameters.map((p) => p.metallicity) },
      { name: 'alpha', type: 'float64', values: parameters.map((p) => p.alpha) },
      { name: 'carbon', type: 'float64', values: parameters.map((p) => p.carbon) },
      {
        name: 'scale',
        type: 'float64',
        unit: 'erg s-1 cm-2 Angstrom-1',
        values: stars.map((star) => star.scale),
      },
    ],
  });
}
