import type { EncodedColumn } from './column-bytes.ts';
import { encodeColumn } from './column-bytes.ts';
import type { CardSpec, ColumnSpec, TableSpec } from './hdu-spec.ts';
import type { HduParts } from './hdu-parts.ts';
import { zeroPadded } from './hdu-parts.ts';

/** FITS 4.0, section 7.3.1. */
const MOST_COLUMNS = 999;

/**
 * Cards and data of a binary table (FITS 4.0, section 7.3).
 *
 * @throws RangeError when a column does not fit `rowCount` or holds what FITS cannot
 */
export function tableParts(table: TableSpec): HduParts {
  if (table.columns.length > MOST_COLUMNS) {
    throw new RangeError(`a table must have at most ${MOST_COLUMNS} columns, got ${table.columns.length}`);
  }
  const encoded = table.columns.map((column) => encodeColumn(column, table.rowCount));
  const rowBytes = encoded.reduce((sum, column) => sum + column.width, 0);
  const data = zeroPadded(rowBytes * table.rowCount);
  const view = new DataView(data.buffer);
  let start = 0;
  for (const column of encoded) {
    column.put(view, start, rowBytes);
    start += column.width;
  }
  const structure: CardSpec[] = [
    { keyword: 'BITPIX', value: 8, comment: 'array data type' },
    { keyword: 'NAXIS', value: 2, comment: 'number of array dimensions' },
    { keyword: 'NAXIS1', value: rowBytes, comment: 'bytes per row' },
    { keyword: 'NAXIS2', value: table.rowCount, comment: 'rows' },
    { keyword: 'PCOUNT', value: 0, comment: 'bytes after the rows' },
    { keyword: 'GCOUNT', value: 1, comment: 'groups' },
    { keyword: 'TFIELDS', value: table.columns.length, comment: 'columns' },
    ...table.columns.flatMap((column, i) => columnCards(column, encoded[i]!, i + 1)),
  ];
  return { extension: 'BINTABLE', structure, data };
}

function columnCards(column: ColumnSpec, encoded: EncodedColumn, number: number): CardSpec[] {
  const card = (stem: string, value: string | undefined): CardSpec[] =>
    value === undefined || value === '' ? [] : [{ keyword: `${stem}${number}`, value }];
  return [
    ...card('TTYPE', column.name),
    ...card('TFORM', encoded.form),
    ...card('TUNIT', column.unit),
    ...card('TDISP', column.display),
    ...(encoded.missing === undefined ? [] : [{ keyword: `TNULL${number}`, value: encoded.missing }]),
    ...card('TUCD', column.ucd),
    ...card('TCOMM', column.description),
  ];
}
