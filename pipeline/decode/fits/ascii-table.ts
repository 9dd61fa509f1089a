import type { FaultPlace } from '../../errors.ts';
import { InputFault } from '../../errors.ts';
import { cellText } from './cell-text.ts';
import type { ColumnPlan } from './column.ts';
import type { DataRange } from './data-range.ts';
import type { DataUnit } from './data-unit.ts';
import { integerOffset } from './elements.ts';
import type { ParsedHeader } from './header.ts';
import { integerCard, numberCard, textCard } from './header.ts';
import type { TableHdu } from './model.ts';
import type { TableBytes } from './table-bytes.ts';
import { packColumn } from './table-bytes.ts';

/** A column of text fields. Its type letter is A for text, K for integers and D for reals. */
interface FieldPlan extends ColumnPlan {
  /** TNULL: the text that means missing; null when no text does. */
  readonly missing: string | null;
  /** Digits after the point in a field that is written without one. */
  readonly impliedDecimals: number;
}

/** Aw, Iw, Fw.d, Ew.d, Dw.d (FITS 4.0, table 15). */
const TFORM = /^([AIFED])(\d+)(?:\.(\d+))?$/;
const INTEGER = /^[+-]?\d+$/;
const REAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[EDed][+-]?\d+)?$/;

/**
 * An ASCII table whose columns are read on demand (FITS 4.0, section 7.2). Blank numeric fields are missing: Fortran
 * reads them as 0, but nobody writes a measured 0 that way.
 *
 * @param name EXTNAME
 * @throws InputFault fits-bad-header when the column cards contradict each other or NAXIS
 */
export function openAsciiTable(
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
  const table: TableBytes = { ...range, rowBytes, rowCount: unit.axes[1]!, heapOffset: range.byteLength };
  const fieldCount = Math.max(0, integerCard(header, 'TFIELDS', place));
  const plans = Array.from({ length: fieldCount }, (_, i) => planField(header, i + 1, rowBytes, place));
  const planOf = (column: number): FieldPlan => {
    const plan = plans[column];
    if (plan === undefined) {
      throw new RangeError(`column must be an integer from 0 to ${plans.length - 1}, got ${column}`);
    }
    return plan;
  };
  const refuse = (column: number, wanted: string): never => {
    throw new TypeError(`column '${planOf(column).column.name}' must hold ${wanted}, got text fields`);
  };
  return {
    type: 'table',
    index: range.hdu,
    name,
    header,
    rowCount: table.rowCount,
    columns: plans.map((plan) => plan.column),
    readNumbers: (column, first, count) => readNumbers(table, planOf(column), first, count),
    readIntegers: (column, first, count) => readIntegers(table, planOf(column), first, count),
    readStrings: (column, first, count) => readStrings(table, planOf(column), first, count),
    readLogicals: (column) => refuse(column, 'logicals'),
    readBits: (column) => refuse(column, 'bits'),
    readCell: (column, row) => readNumbers(table, planOf(column), row, 1),
  };
}

function planField(header: ParsedHeader, number: number, rowBytes: number, place: FaultPlace): FieldPlan {
  const form = textCard(header, `TFORM${number}`, place).toUpperCase();
  const match = TFORM.exec(form);
  if (match === null) {
    const detail = `TFORM${number} must be an ASCII table format, got '${form}'`;
    throw new InputFault('fits-bad-header', place, detail);
  }
  const width = Number(match[2]);
  // TBCOL counts from 1.
  const offset = integerCard(header, `TBCOL${number}`, place) - 1;
  if (offset < 0 || offset + width > rowBytes) {
    const detail = `TBCOL${number} and TFORM${number} must lie inside the ${rowBytes} bytes of a row`;
    throw new InputFault('fits-bad-header', place, `${detail}, got bytes ${offset + 1} to ${offset + width}`);
  }
  const isText = match[1] === 'A';
  const repeat = isText ? width : 1;
  return {
    column: {
      name: textCard(header, `TTYPE${number}`, place),
      unit: textCard(header, `TUNIT${number}`, place),
      ucd: textCard(header, `TUCD${number}`, place),
      code: isText ? 'A' : match[1] === 'I' ? 'K' : 'D',
      repeat,
      shape: [repeat],
    },
    offset,
    width,
    scaling: {
      scale: Number(numberCard(header, `TSCAL${number}`, place, 1)),
      zero: numberCard(header, `TZERO${number}`, place, 0),
      blank: null,
    },
    missing: header.get(`TNULL${number}`) === undefined ? null : textCard(header, `TNULL${number}`, place),
    impliedDecimals: Number(match[3] ?? 0),
  };
}

/** The fields without blanks around them; null where missing. */
function fields(table: TableBytes, plan: FieldPlan, first: number, count: number): (string | null)[] {
  const packed = packColumn(table, plan, first, count);
  return Array.from({ length: count }, (_, i) => {
    const text = cellText(packed.subarray(i * plan.width, (i + 1) * plan.width)).trim();
    return text === '' || text === plan.missing ? null : text;
  });
}

function readNumbers(table: TableBytes, plan: FieldPlan, first: number, count: number): Float64Array {
  if (plan.column.code === 'A') {
    throw new TypeError(`column '${plan.column.name}' must hold numbers, got text`);
  }
  const zero = Number(plan.scaling.zero);
  return Float64Array.from(fields(table, plan, first, count), (text, i) => {
    if (text === null) return NaN;
    if (!REAL.test(text)) throw badField(table, plan, first + i, text);
    const implied = text.includes('.') ? 1 : 10 ** -plan.impliedDecimals;
    return zero + plan.scaling.scale * (Number(text.replace(/d/i, 'E')) * implied);
  });
}

function readIntegers(table: TableBytes, plan: FieldPlan, first: number, count: number): (bigint | null)[] {
  const offset = plan.column.code === 'K' ? integerOffset(plan.scaling) : null;
  if (offset === null) {
    throw new TypeError(`column '${plan.column.name}' must hold unscaled integers, got ${plan.column.code}`);
  }
  return fields(table, plan, first, count).map((text, i) => {
    if (text === null) return null;
    if (!INTEGER.test(text)) throw badField(table, plan, first + i, text);
    return BigInt(text.replace(/^\+/, '')) + offset;
  });
}

function readStrings(table: TableBytes, plan: FieldPlan, first: number, count: number): string[] {
  const { scale, zero } = plan.scaling;
  if (plan.column.code === 'A') {
    const packed = packColumn(table, plan, first, count);
    return Array.from({ length: count }, (_, i) =>
      cellText(packed.subarray(i * plan.width, (i + 1) * plan.width)),
    );
  }
  if (scale === 1 && Number(zero) === 0) {
    return fields(table, plan, first, count).map((text) => text ?? '');
  }
  return Array.from(readNumbers(table, plan, first, count), (value) =>
    Number.isNaN(value) ? '' : String(value),
  );
}

function badField(table: TableBytes, plan: FieldPlan, row: number, text: string): InputFault {
  const place = { file: table.source.label, hdu: table.hdu, row };
  const detail = `column '${plan.column.name}' must hold a number, got '${text}'`;
  return new InputFault('value-not-usable', place, detail);
}
