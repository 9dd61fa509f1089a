import type { FaultPlace } from '../../errors.ts';
import { InputFault } from '../../errors.ts';
import { cellBits, cellLogical, cellText, numberText } from './cell-text.ts';
import type { ColumnPlan } from './column.ts';
import { elementOfCode, partsOfCode, planColumn } from './column.ts';
import type { DataRange } from './data-range.ts';
import type { DataUnit } from './data-unit.ts';
import { decodeIntegers, decodeNumbers, integerOffset } from './elements.ts';
import type { ParsedHeader } from './header.ts';
import { integerCard } from './header.ts';
import type { Numbers, TableHdu } from './model.ts';
import { packColumn, readHeapCell } from './table-bytes.ts';
import type { TableBytes } from './table-bytes.ts';

/** FITS 4.0, section 7.3.1. */
const MOST_COLUMNS = 999;

/**
 * A binary table whose columns are read on demand (FITS 4.0, section 7.3).
 *
 * @param name EXTNAME
 * @throws InputFault fits-bad-header when the column cards contradict each other or NAXIS
 */
export function openBinaryTable(
  header: ParsedHeader,
  unit: DataUnit,
  range: DataRange,
  name: string,
): TableHdu {
  const place: FaultPlace = { file: range.source.label, hdu: range.hdu };
  if (unit.axes.length !== 2 || unit.bitpix !== 8) {
    const got = `BITPIX ${unit.bitpix} and ${unit.axes.length} axes`;
    throw new InputFault('fits-bad-header', place, `a table must have BITPIX 8 and 2 axes, got ${got}`);
  }
  const rowBytes = unit.axes[0]!;
  const rowCount = unit.axes[1]!;
  const plans = planColumns(header, rowBytes, place);
  const heapOffset = integerCard(header, 'THEAP', place, rowBytes * rowCount);
  const table: TableBytes = { ...range, rowBytes, rowCount, heapOffset };
  const planOf = (column: number): ColumnPlan => {
    const plan = plans[column];
    if (plan === undefined) {
      throw new RangeError(`column must be an integer from 0 to ${plans.length - 1}, got ${column}`);
    }
    return plan;
  };
  return {
    type: 'table',
    index: range.hdu,
    name,
    header,
    rowCount,
    columns: plans.map((plan) => plan.column),
    readNumbers: (column, first, count) => readNumbers(table, planOf(column), first, count),
    readIntegers: (column, first, count) => readIntegers(table, planOf(column), first, count),
    readStrings: (column, first, count) => readStrings(table, planOf(column), first, count),
    readLogicals: (column, first, count) => readLogicals(table, planOf(column), first, count),
    readBits: (column, first, count) => {
      const plan = planOf(column);
      refuseOtherThan('X', plan);
      return cellsOf(table, plan, first, count).map((cell) => cellBits(cell, plan.column.repeat));
    },
    readCell: (column, row) => readCell(table, planOf(column), row),
  };
}

function planColumns(header: ParsedHeader, rowBytes: number, place: FaultPlace): ColumnPlan[] {
  const columnCount = integerCard(header, 'TFIELDS', place);
  if (columnCount < 0 || columnCount > MOST_COLUMNS) {
    const detail = `TFIELDS must be from 0 to ${MOST_COLUMNS}, got ${columnCount}`;
    throw new InputFault('fits-bad-header', place, detail);
  }
  const plans: ColumnPlan[] = [];
  let offset = 0;
  for (let number = 1; number <= columnCount; number++) {
    const plan = planColumn(header, number, offset, place);
    plans.push(plan);
    offset += plan.width;
  }
  if (offset !== rowBytes) {
    const detail = `NAXIS1 must be the ${offset} bytes its columns take, got ${rowBytes}`;
    throw new InputFault('fits-bad-header', place, detail);
  }
  return plans;
}

function readNumbers(table: TableBytes, plan: ColumnPlan, first: number, count: number): Numbers {
  const { code, repeat } = plan.column;
  const values = packedNumbers(packColumn(table, plan, first, count), code, count * repeat, plan);
  if (values === null) throw wrongCode(plan, 'numbers');
  return values;
}

/** Numbers of a packed run of elements; null when the type letter holds none. */
function packedNumbers(bytes: Uint8Array, code: string, elements: number, plan: ColumnPlan): Numbers | null {
  if (code === 'L') {
    return Float64Array.from(bytes.subarray(0, elements), (byte) => {
      const value = cellLogical(byte);
      return value === null ? NaN : Number(value);
    });
  }
  const element = elementOfCode(code);
  if (element === null) return null;
  const parts = partsOfCode(code);
  const { scaling } = plan;
  if (parts === 1) return decodeNumbers(bytes, element, elements, scaling);
  // The zero point of a complex column is a real number: it moves the real part only.
  const pairs = decodeNumbers(bytes, element, elements * parts, { ...scaling, zero: 0 });
  const zero = Number(scaling.zero);
  if (zero !== 0) for (let i = 0; i < pairs.length; i += 2) pairs[i] = pairs[i]! + zero;
  return pairs;
}

function readIntegers(table: TableBytes, plan: ColumnPlan, first: number, count: number): (bigint | null)[] {
  const { code, repeat, name } = plan.column;
  const element = elementOfCode(code);
  if (element === null || !'BIJK'.includes(code) || repeat !== 1)
    throw wrongCode(plan, 'one integer per row');
  const offset = integerOffset(plan.scaling);
  if (offset === null) {
    const place = { file: table.source.label, hdu: table.hdu };
    const { scale, zero } = plan.scaling;
    const detail = `column '${name}' must hold unscaled integers, got scale ${scale} and zero ${String(zero)}`;
    throw new InputFault('value-not-usable', place, detail);
  }
  return decodeIntegers(packColumn(table, plan, first, count), element, count, offset, plan.scaling.blank);
}

function readStrings(table: TableBytes, plan: ColumnPlan, first: number, count: number): string[] {
  const { code, repeat, elementCode } = plan.column;
  if (code === 'A') return cellsOf(table, plan, first, count).map(cellText);
  if (code === 'X') return cellsOf(table, plan, first, count).map((cell) => cellBits(cell, repeat));
  if (code === 'P' || code === 'Q') {
    return Array.from({ length: count }, (_, i) => {
      if (elementCode === 'A') return cellText(readHeapCell(table, plan, first + i).bytes);
      return numbersText(readCell(table, plan, first + i), elementCode === 'E' || elementCode === 'C');
    });
  }
  if (code === 'L' && repeat === 1) {
    return readLogicals(table, plan, first, count).map((value) => (value === null ? '' : String(value)));
  }
  if ('BIJK'.includes(code) && repeat === 1 && integerOffset(plan.scaling) !== null) {
    // Exact beyond 2^53, where identifiers live.
    return readIntegers(table, plan, first, count).map((value) => (value === null ? '' : String(value)));
  }
  const values = readNumbers(table, plan, first, count);
  const perRow = repeat * partsOfCode(code);
  const single = code === 'E' || code === 'C';
  return Array.from({ length: count }, (_, i) =>
    numbersText(values.subarray(i * perRow, (i + 1) * perRow), single),
  );
}

function numbersText(values: Numbers, single: boolean): string {
  return Array.from(values, (value) => numberText(value, single)).join(' ');
}

function readLogicals(table: TableBytes, plan: ColumnPlan, first: number, count: number): (boolean | null)[] {
  refuseOtherThan('L', plan);
  return cellsOf(table, plan, first, count).map((cell) => cellLogical(cell[0] ?? 0));
}

function readCell(table: TableBytes, plan: ColumnPlan, row: number): Numbers {
  const { elementCode } = plan.column;
  if (elementCode === undefined) return readNumbers(table, plan, row, 1);
  const cell = readHeapCell(table, plan, row);
  const values = packedNumbers(cell.bytes, elementCode, cell.elements, plan);
  if (values === null) throw wrongCode(plan, 'numbers');
  return values;
}

function cellsOf(table: TableBytes, plan: ColumnPlan, first: number, count: number): Uint8Array[] {
  const packed = packColumn(table, plan, first, count);
  return Array.from({ length: count }, (_, i) => packed.subarray(i * plan.width, (i + 1) * plan.width));
}

function refuseOtherThan(code: string, plan: ColumnPlan): void {
  if (plan.column.code !== code) throw wrongCode(plan, `type ${code}`);
}

function wrongCode(plan: ColumnPlan, wanted: string): TypeError {
  const { name, code, repeat } = plan.column;
  return new TypeError(`column '${name}' must hold ${wanted}, got type ${code} with repeat ${repeat}`);
}
