import { putAscii, requireAscii } from './ascii.ts';
import type { ColumnSpec } from './hdu-spec.ts';

/** How one column stands in a table: its format and how its cells are put down. */
export interface EncodedColumn {
  /** TFORM. */
  readonly form: string;
  /** Bytes of one cell. */
  readonly width: number;
  /** TNULL; absent when the column has no missing integers. */
  readonly missing?: number | bigint;
  /** Writes all cells: the first at byte `start` of the table, each next one `rowBytes` on. */
  readonly put: (table: DataView, start: number, rowBytes: number) => void;
}

const LOWEST_INT32 = -(2 ** 31);
const LOWEST_INT64 = -(2n ** 63n);
const TRUE = 0x54;
const FALSE = 0x46;
const BLANK = 0x20;

/**
 * Plans the cells of a column.
 *
 * @throws RangeError when the column has another number of values than `rowCount` asks for, or a value does not fit
 */
export function encodeColumn(column: ColumnSpec, rowCount: number): EncodedColumn {
  const perRow = 'repeat' in column ? (column.repeat ?? 1) : 1;
  if (column.values.length !== rowCount * perRow) {
    const wanted = rowCount * perRow;
    throw new RangeError(`column '${column.name}' must have ${wanted} values, got ${column.values.length}`);
  }
  switch (column.type) {
    case 'logical':
      return {
        form: 'L',
        width: 1,
        put: (table, start, rowBytes) => {
          for (const [row, value] of column.values.entries()) {
            table.setUint8(start + row * rowBytes, value === null ? 0 : value ? TRUE : FALSE);
          }
        },
      };
    case 'int32':
      return encodeInt32(column.name, column.values, column.missing);
    case 'int64':
      return encodeInt64(column.name, column.values, column.missing);
    case 'float32':
    case 'float64':
      return encodeFloats(column.type, column.values, perRow);
    case 'string':
      return encodeStrings(column.name, column.values, column.length);
  }
}

type ValuesOf<K extends ColumnSpec['type']> = Extract<ColumnSpec, { readonly type: K }>['values'];

function encodeInt32(name: string, values: ValuesOf<'int32'>, missing = LOWEST_INT32): EncodedColumn {
  let anyMissing = false;
  for (const value of values) {
    if (value === null) anyMissing = true;
    else if (value !== (value | 0)) throw new RangeError(`column '${name}' must hold int32, got ${value}`);
  }
  if (anyMissing) for (const value of values) refuseMissing(name, value, missing);
  return {
    form: 'J',
    width: 4,
    ...(anyMissing ? { missing } : {}),
    put: (table, start, rowBytes) => {
      for (let row = 0; row < values.length; row++) {
        table.setInt32(start + row * rowBytes, values[row] ?? missing);
      }
    },
  };
}

function encodeInt64(name: string, values: ValuesOf<'int64'>, missing = LOWEST_INT64): EncodedColumn {
  let anyMissing = false;
  for (const value of values) {
    if (value === null) anyMissing = true;
    else if (value !== BigInt.asIntN(64, value)) {
      throw new RangeError(`column '${name}' must hold int64, got ${String(value)}`);
    }
  }
  if (anyMissing) for (const value of values) refuseMissing(name, value, missing);
  return {
    form: 'K',
    width: 8,
    ...(anyMissing ? { missing } : {}),
    put: (table, start, rowBytes) => {
      for (let row = 0; row < values.length; row++) {
        table.setBigInt64(start + row * rowBytes, values[row] ?? missing);
      }
    },
  };
}

/** A real value that equals the missing one would read back as missing. */
function refuseMissing(name: string, value: number | bigint | null, missing: number | bigint): void {
  if (value === missing) {
    throw new RangeError(`column '${name}' must not hold its missing value, got ${String(value)}`);
  }
}

function encodeFloats(
  type: 'float32' | 'float64',
  values: ValuesOf<'float32' | 'float64'>,
  perRow: number,
): EncodedColumn {
  const size = type === 'float32' ? 4 : 8;
  const letter = type === 'float32' ? 'E' : 'D';
  return {
    form: perRow === 1 ? letter : `${perRow}${letter}`,
    width: size * perRow,
    put: (table, start, rowBytes) => {
      for (let next = 0, cell = start; next < values.length; cell += rowBytes) {
        for (let i = 0; i < perRow; i++) {
          const value = values[next++] ?? NaN;
          if (size === 4) table.setFloat32(cell + 4 * i, value);
          else table.setFloat64(cell + 8 * i, value);
        }
      }
    },
  };
}

function encodeStrings(name: string, values: ValuesOf<'string'>, length: number | undefined): EncodedColumn {
  // A width of 0 is legal but some readers stumble over it.
  let width = length ?? 1;
  for (const value of values) {
    if (value === null) continue;
    requireAscii(value, `column '${name}'`);
    if (length === undefined) width = Math.max(width, value.length);
    else if (value.length > length) {
      throw new RangeError(`column '${name}' must have at most ${length} characters, got '${value}'`);
    }
  }
  return {
    form: `${width}A`,
    width,
    put: (table, start, rowBytes) => {
      const bytes = new Uint8Array(table.buffer, table.byteOffset, table.byteLength);
      for (const [row, value] of values.entries()) {
        const cell = start + row * rowBytes;
        bytes.fill(BLANK, cell, cell + width);
        putAscii(bytes, cell, value ?? '');
      }
    },
  };
}
