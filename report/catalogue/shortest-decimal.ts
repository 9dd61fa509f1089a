import type { ColumnType } from './columns.ts';

/** Nine significant digits identify every 32-bit float (IEEE 754-2019, 5.12.2). */
const FLOAT_DIGITS_AT_MOST = 9;

/**
 * The shortest decimal that reads back to the same value at the width of its column.
 *
 * @param value finite; for `float` already rounded to 32 bits
 */
export function shortestDecimal(value: number, type: ColumnType): string {
  if (type !== 'float') return String(value);
  for (let digits = 1; digits < FLOAT_DIGITS_AT_MOST; digits++) {
    const decimal = Number(value.toPrecision(digits));
    if (Math.fround(decimal) === value) return String(decimal);
  }
  return String(Number(value.toPrecision(FLOAT_DIGITS_AT_MOST)));
}
