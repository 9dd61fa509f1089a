import { InputFault } from '../../errors.ts';
import type { ColumnPlan } from './column.ts';
import { bytesOfElements } from './column.ts';
import type { DataRange } from './data-range.ts';
import { checkRows, readBytes } from './data-range.ts';

/** The bytes of a binary table: rows, then the heap of the variable-length columns. */
export interface TableBytes extends DataRange {
  readonly rowBytes: number;
  readonly rowCount: number;
  /** THEAP: bytes from the start of the data to the heap. */
  readonly heapOffset: number;
}

/** Whole rows are read in pieces of about this size: large enough that the number of reads does not count. */
const READ_PIECE_BYTES = 4 << 20;
/**
 * From this many unwanted bytes per row on, each cell is read by itself: one read costs about as much as the copy of
 * some kilobytes (common practice, no source).
 */
const SPARSE_ROW_BYTES = 16_384;

/**
 * The cells of one column over a row range, packed end to end: `count * plan.width` bytes.
 *
 * @throws InputFault row-missing, fits-truncated
 */
export function packColumn(table: TableBytes, plan: ColumnPlan, first: number, count: number): Uint8Array {
  const { rowBytes, rowCount } = table;
  const { width, offset } = plan;
  checkRows(table, rowBytes, rowCount, first, count);
  // A table of one column is packed as it stands.
  if (width === rowBytes) return readBytes(table, first * rowBytes, count * rowBytes, first);
  const packed = new Uint8Array(count * width);
  if (width === 0) return packed;
  if (rowBytes - width >= SPARSE_ROW_BYTES) {
    for (let i = 0; i < count; i++) {
      const row = first + i;
      packed.set(readBytes(table, row * rowBytes + offset, width, row), i * width);
    }
    return packed;
  }
  const rowsPerRead = Math.max(1, Math.floor(READ_PIECE_BYTES / rowBytes));
  for (let done = 0; done < count; done += rowsPerRead) {
    const rows = Math.min(rowsPerRead, count - done);
    const bytes = readBytes(table, (first + done) * rowBytes, rows * rowBytes, first + done);
    for (let i = 0; i < rows; i++) {
      const start = i * rowBytes + offset;
      packed.set(bytes.subarray(start, start + width), (done + i) * width);
    }
  }
  return packed;
}

/** The elements of one variable-length cell as they stand in the heap. */
export interface HeapCell {
  readonly bytes: Uint8Array;
  readonly elements: number;
}

/**
 * Follows the descriptor of a P or Q cell into the heap (FITS 4.0, section 7.3.5).
 *
 * @throws InputFault value-not-usable when the descriptor points outside the heap, row-missing, fits-truncated
 */
export function readHeapCell(table: TableBytes, plan: ColumnPlan, row: number): HeapCell {
  const packed = packColumn(table, plan, row, 1);
  // A repeat of 0 leaves no room for a descriptor: the cell is empty.
  if (packed.length === 0) return { bytes: packed, elements: 0 };
  const view = new DataView(packed.buffer, packed.byteOffset, packed.length);
  const isLong = plan.column.code === 'Q';
  const elements = isLong ? Number(view.getBigInt64(0)) : view.getInt32(0);
  const start = isLong ? Number(view.getBigInt64(8)) : view.getInt32(4);
  if (elements === 0) return { bytes: new Uint8Array(0), elements };
  const length = bytesOfElements(plan.column.elementCode!, elements);
  const heapBytes = table.byteLength - table.heapOffset;
  if (elements < 0 || start < 0 || start + length > heapBytes) {
    const place = { file: table.source.label, hdu: table.hdu, row };
    const got = `${elements} elements from byte ${start}`;
    throw new InputFault(
      'value-not-usable',
      place,
      `array of column '${plan.column.name}' must lie inside the heap of ${heapBytes} bytes, got ${got}`,
    );
  }
  return { bytes: readBytes(table, table.heapOffset + start, length, row), elements };
}
