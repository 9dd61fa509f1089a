import { InputFault } from '../../errors.ts';
import type { ByteSource } from '../byte-source.ts';

/** The data of one HDU inside its source. */
export interface DataRange {
  readonly source: ByteSource;
  readonly hdu: number;
  /** Byte offset of the data in the source. */
  readonly offset: number;
  /** Bytes the header promises, without padding. */
  readonly byteLength: number;
}

/**
 * `length` bytes from `start` (relative to the data).
 *
 * @param row named in the message when the file ends too early
 * @throws InputFault fits-truncated when the source does not hold all of them
 */
export function readBytes(range: DataRange, start: number, length: number, row: number): Uint8Array {
  // Asked before reading, so that a header that promises terabytes costs no memory.
  const have = range.source.size - range.offset - start;
  const bytes = have < length ? null : range.source.read(range.offset + start, length);
  if (bytes?.length !== length) {
    const place = { file: range.source.label, hdu: range.hdu, row };
    const got = Math.max(0, bytes?.length ?? have);
    throw new InputFault('fits-truncated', place, `the data must have ${length} more bytes, got ${got}`);
  }
  return bytes;
}

/**
 * Checks a row range against the rows an HDU has and the rows the file still holds.
 *
 * @param rowBytes bytes of one row
 * @throws RangeError when `first` or `count` is not an integer >= 0
 * @throws InputFault row-missing beyond the last row, fits-truncated at the first row that is cut off
 */
export function checkRows(
  range: DataRange,
  rowBytes: number,
  rowCount: number,
  first: number,
  count: number,
): void {
  if (!Number.isSafeInteger(first) || !Number.isSafeInteger(count) || first < 0 || count < 0) {
    throw new RangeError(`first and count must be integers of at least 0, got ${first} and ${count}`);
  }
  const end = first + count;
  const place = { file: range.source.label, hdu: range.hdu };
  if (end > rowCount) {
    const row = Math.max(first, rowCount);
    throw new InputFault('row-missing', { ...place, row }, `rows must be below ${rowCount}, got ${end - 1}`);
  }
  const whole = wholeRows(range, rowBytes, rowCount);
  if (end > whole) {
    const row = Math.max(first, whole);
    throw new InputFault('fits-truncated', { ...place, row }, `the file must hold ${end} rows, got ${whole}`);
  }
}

function wholeRows(range: DataRange, rowBytes: number, rowCount: number): number {
  if (rowBytes === 0) return rowCount;
  return Math.min(rowCount, Math.floor((range.source.size - range.offset) / rowBytes));
}
