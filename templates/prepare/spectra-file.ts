import { type CardSpec, type ColumnSpec, encodeFits } from '../../pipeline/encode/index.ts';
import type { LogGrid } from '../family.ts';

/** Spectra on one grid with what is known about each: the content of a family file. */
export interface SpectraTable {
  readonly grid: LogGrid;
  readonly rows: readonly Float32Array[];
  /** Columns of the table, one value per spectrum. */
  readonly columns: readonly ColumnSpec[];
}

/**
 * A family file: FITS with an image (rows = spectra) and a table with one row per spectrum. The same input gives
 * the same bytes.
 */
export function encodeSpectra({ grid, rows, columns }: SpectraTable): Uint8Array {
  const pixels = new Float32Array(grid.length * rows.length);
  rows.forEach((row, r) => {
    pixels.set(row, r * grid.length);
  });
  return encodeFits([
    { type: 'image', axes: [] },
    { type: 'image', name: 'FLUX', axes: [grid.length, rows.length], pixels, cards: waveCards(grid) },
    { type: 'table', name: 'MODELS', rowCount: rows.length, columns },
  ]);
}

/** Axis 1: wavelength uniform in its logarithm (Greisen et al. 2006, A&A 446, 747, eq 5), vacuum ångström. */
function waveCards(grid: LogGrid): CardSpec[] {
  const start = Math.exp(grid.lnStart);
  return [
    { keyword: 'CTYPE1', value: 'WAVE-LOG', comment: 'vacuum wavelength, logarithmic' },
    { keyword: 'CUNIT1', value: 'Angstrom' },
    { keyword: 'CRPIX1', value: 1 },
    { keyword: 'CRVAL1', value: start },
    { keyword: 'CDELT1', value: start * grid.step },
  ];
}
