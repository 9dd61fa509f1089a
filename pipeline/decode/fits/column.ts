import type { FaultPlace } from '../../errors.ts';
import { InputFault } from '../../errors.ts';
import type { Element, Scaling } from './elements.ts';
import { UNSCALED } from './elements.ts';
import type { ParsedHeader } from './header.ts';
import { integerOrNull, numberCard, textCard } from './header.ts';
import type { TableColumn } from './model.ts';

/** A column and where its bytes are. */
export interface ColumnPlan {
  readonly column: TableColumn;
  /** Bytes from the start of a row. */
  readonly offset: number;
  /** Bytes of one cell inside the row. */
  readonly width: number;
  readonly scaling: Scaling;
}

/** Bytes of one element of each type letter (FITS 4.0, table 18); X is counted in bits. */
const BYTES_OF_CODE: Readonly<Record<string, number>> = {
  L: 1,
  B: 1,
  I: 2,
  J: 4,
  K: 8,
  A: 1,
  E: 4,
  D: 8,
  C: 8,
  M: 16,
  P: 8,
  Q: 16,
};

const TFORM = /^(\d*)([LXBIJKAEDCMPQ])(.*)$/;
/** Element type and largest length of a variable-length column, e.g. E(120). */
const ARRAY_FORM = /^([LXBIJKAEDCM])(?:\((\d*)\))?/;
const UNSCALED_CODES = new Set(['A', 'L', 'X']);

/** How the parts of a number are stored for a type letter; null for text, logicals and bits. C and M hold two. */
export function elementOfCode(code: string): Element | null {
  switch (code) {
    case 'B':
      return 'u8';
    case 'I':
      return 'i16';
    case 'J':
      return 'i32';
    case 'K':
      return 'i64';
    case 'E':
    case 'C':
      return 'f32';
    case 'D':
    case 'M':
      return 'f64';
    default:
      return null;
  }
}

/** Numbers per element of a type letter: complex numbers are pairs. */
export function partsOfCode(code: string): number {
  return code === 'C' || code === 'M' ? 2 : 1;
}

/** Bytes that `count` elements of a type letter take. */
export function bytesOfElements(code: string, count: number): number {
  return code === 'X' ? Math.ceil(count / 8) : count * BYTES_OF_CODE[code]!;
}

/**
 * Column `number` (from 1) of a binary table (FITS 4.0, section 7.3).
 *
 * @param offset bytes from the start of the row, the sum of the widths before it
 * @throws InputFault fits-bad-header when TFORM or a scaling card cannot be read
 */
export function planColumn(
  header: ParsedHeader,
  number: number,
  offset: number,
  place: FaultPlace,
): ColumnPlan {
  const form = textCard(header, `TFORM${number}`, place).toUpperCase();
  const match = TFORM.exec(form);
  if (match === null) throw badForm(place, number, form);
  const code = match[2]!;
  const declared = match[1] === '' ? 1 : Number(match[1]);
  const isVariable = code === 'P' || code === 'Q';
  const array = isVariable ? ARRAY_FORM.exec(match[3]!) : null;
  if (isVariable && (array === null || declared > 1)) throw badForm(place, number, form);
  const repeat = isVariable ? Number(array?.[2] ?? 0) : declared;
  const elementCode = array?.[1];
  return {
    column: {
      name: textCard(header, `TTYPE${number}`, place),
      unit: textCard(header, `TUNIT${number}`, place),
      ucd: textCard(header, `TUCD${number}`, place),
      code,
      repeat,
      shape: cellShape(textCard(header, `TDIM${number}`, place), repeat),
      ...(elementCode === undefined ? {} : { elementCode }),
    },
    offset,
    width: bytesOfElements(code, declared),
    scaling: columnScaling(header, number, elementCode ?? code, place),
  };
}

/** TDIM as axis lengths; a TDIM that does not fit the cell is passed over, as the flat cell is still right. */
function cellShape(dimensions: string, repeat: number): readonly number[] {
  const match = /^\(\s*(\d+(?:\s*,\s*\d+)*)\s*\)$/.exec(dimensions);
  if (match === null) return [repeat];
  const shape = match[1]!.split(',').map(Number);
  return shape.reduce((product, axis) => product * axis, 1) === repeat ? shape : [repeat];
}

function columnScaling(header: ParsedHeader, number: number, code: string, place: FaultPlace): Scaling {
  if (UNSCALED_CODES.has(code)) return UNSCALED;
  const isInteger = 'BIJK'.includes(code);
  return {
    scale: Number(numberCard(header, `TSCAL${number}`, place, 1)),
    zero: numberCard(header, `TZERO${number}`, place, 0),
    blank: isInteger ? integerOrNull(header, `TNULL${number}`, place) : null,
  };
}

function badForm(place: FaultPlace, number: number, form: string): InputFault {
  const detail = `TFORM${number} must be a binary table format, got '${form}'`;
  return new InputFault('fits-bad-header', place, detail);
}
