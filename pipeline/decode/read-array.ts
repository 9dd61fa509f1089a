import { InputFault } from '../errors.ts';
import type { FitsFile } from './fits/model.ts';
import type { ArraySource } from './layout.ts';

/**
 * Read one array of one spectrum.
 *
 * @param file the opened file
 * @param source where the array is
 * @param row which spectrum, 0-based; ignored where the HDU holds one spectrum
 * @param rowCount spectra in the file
 * @returns a fresh array; for an image with several rows per spectrum all of them one after another
 * @throws InputFault `row-missing` when the HDU or row is not there, `layout-unknown` for a missing column
 */
export function readArray(file: FitsFile, source: ArraySource, row: number, rowCount: number): Float64Array {
  const place = { file: file.label, hdu: source.hdu, row };
  const hdu = file.hdus.find(({ index }) => index === source.hdu);
  if (hdu === undefined || hdu.type === 'other') {
    const detail = `HDU ${source.hdu} must be an image or a table, got ${hdu === undefined ? 'none' : hdu.reason}`;
    throw new InputFault('row-missing', place, detail);
  }
  if (hdu.type === 'table') {
    const column = hdu.columns.findIndex(({ name }) => name === source.column);
    if (column < 0) {
      throw new InputFault(
        'layout-unknown',
        place,
        `column '${String(source.column)}' must be there, got none`,
      );
    }
    const { repeat, code } = hdu.columns[column]!;
    const isVector = repeat !== 1 || code === 'P' || code === 'Q';
    if (!isVector) return hdu.readNumbers(column, 0, hdu.rowCount);
    return hdu.readCell(column, requireRow(row, hdu.rowCount));
  }
  if (source.imageRow !== null) return hdu.readRows(requireRow(source.imageRow, hdu.rowCount), 1);
  if (hdu.rowCount === 1) return hdu.readRows(0, 1);
  const perSpectrum = Math.max(1, Math.floor(hdu.rowCount / rowCount));
  return hdu.readRows(requireRow(row, rowCount) * perSpectrum, perSpectrum);

  function requireRow(wanted: number, count: number): number {
    if (wanted >= 0 && wanted < count) return wanted;
    throw new InputFault('row-missing', place, `the row must be in 0..${count - 1}, got ${wanted}`);
  }
}
