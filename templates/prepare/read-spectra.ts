import type { FitsFile, ImageHdu, TableHdu } from '../../pipeline/decode/fits/model.ts';
import { InputFault } from '../../pipeline/errors.ts';
import type { LogGrid } from '../family.ts';

/** A family file as read: spectra, and its columns by name. */
export interface ReadSpectra {
  readonly grid: LogGrid;
  readonly rows: readonly Float32Array[];
  /** Text of a column, one per spectrum. @throws InputFault when the column is absent */
  text(column: string): readonly string[];
  /** Numbers of a column, one per spectrum. @throws InputFault when the column is absent */
  numbers(column: string): readonly number[];
}

/**
 * Reads what `encodeSpectra` wrote: the first image of two axes and the first table.
 *
 * @throws InputFault when the file is not such a file
 */
export function readSpectra(file: FitsFile): ReadSpectra {
  if (file.fault) throw file.fault;
  const image = file.hdus.find((hdu): hdu is ImageHdu => hdu.type === 'image' && hdu.axes.length === 2);
  const table = file.hdus.find((hdu): hdu is TableHdu => hdu.type === 'table');
  const fail = (detail: string): InputFault => new InputFault('layout-unknown', { file: file.label }, detail);
  if (!image || !table)
    throw fail('a family file must hold an image of two axes and a table, got neither or one');
  const [length = 0, count = 0] = image.axes;
  if (table.rowCount !== count) {
    throw fail(`the table must have one row per spectrum (${count}), got ${table.rowCount}`);
  }
  const columnOf = (name: string): number => {
    const index = table.columns.findIndex((column) => column.name === name);
    if (index < 0) throw fail(`the table must have a column ${name}, got none`);
    return index;
  };
  const values = image.readRows(0, count);
  return {
    grid: gridOf(image, length, fail),
    rows: Array.from({ length: count }, (_, r) =>
      Float32Array.from(values.subarray(r * length, (r + 1) * length)),
    ),
    text: (name) => table.readStrings(columnOf(name), 0, count),
    numbers: (name) => [...table.readNumbers(columnOf(name), 0, count)],
  };
}

/** Greisen et al. 2006 (A&A 446, 747), eq 5: λ = λ_r exp(w/λ_r), w linear in pixels. */
function gridOf(image: ImageHdu, length: number, fail: (detail: string) => InputFault): LogGrid {
  const value = (keyword: string): number => {
    const found = image.header.get(keyword);
    if (typeof found !== 'number') throw fail(`${keyword} must be a number, got ${String(found)}`);
    return found;
  };
  const type = image.header.get('CTYPE1');
  if (type !== 'WAVE-LOG') throw fail(`CTYPE1 must be WAVE-LOG, got ${String(type)}`);
  const start = value('CRVAL1');
  const step = value('CDELT1') / start;
  return { lnStart: Math.log(start) + (1 - value('CRPIX1')) * step, step, length };
}
