import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { Column } from './columns.ts';

/** A value as every format carries it; null = missing. */
export type Cell = string | number | boolean | null;

/**
 * The value of one column of a row as all four formats write it, so that they agree to the last digit:
 * numbers of `float` columns are rounded to 32 bits here, not by each format in its own way.
 *
 * @returns null when the value is missing, not finite, or finite but outside the range of 32 bits
 * @throws TypeError when the row holds a value of another type than the column
 */
export function cellOf(row: CatalogueRow, column: Column): Cell {
  const value = row[column.name];
  if (value === null) return null;
  const expected = JS_TYPE[column.type];
  if (typeof value !== expected) {
    throw new TypeError(`column ${column.name} must be a ${expected} or null, got ${typeof value}`);
  }
  if (typeof value !== 'number') return value;
  const number = column.type === 'float' ? Math.fround(value) : value;
  if (column.type === 'int' && Number.isFinite(number) && (number | 0) !== number) {
    throw new TypeError(`column ${column.name} must be a 32-bit integer, got ${number}`);
  }
  return Number.isFinite(number) ? number : null;
}

const JS_TYPE = {
  word: 'string',
  text: 'string',
  int: 'number',
  float: 'number',
  double: 'number',
  boolean: 'boolean',
} as const;
