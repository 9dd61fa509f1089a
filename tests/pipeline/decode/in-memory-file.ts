import type {
  CardValue,
  FitsFile,
  Hdu,
  Header,
  ImageHdu,
  TableColumn,
  TableHdu,
} from '../../../pipeline/decode/fits/index.ts';
import { DEFAULT_READ_LIMITS } from '../../../pipeline/decode/index.ts';
import type { OpenedInput } from '../../../pipeline/decode/index.ts';

/** A header of the given cards. */
export function headerOf(
  cards: Readonly<Record<string, CardValue>>,
  comments: readonly string[] = [],
): Header {
  return { get: (keyword) => cards[keyword], keys: () => Object.keys(cards), comments };
}

/** Makes an HDU once its place in the file is known. */
export type HduMaker = (index: number) => Hdu;

/** An image HDU of rows; one row makes a one-dimensional image. `depth` makes axes n x depth x spectra. */
export function image(
  name: string,
  rows: readonly ArrayLike<number>[],
  cards: Readonly<Record<string, CardValue>> = {},
  depth = 1,
): HduMaker {
  return (index): ImageHdu => {
    const n = rows[0]?.length ?? 0;
    const axes =
      rows.length === 0
        ? []
        : rows.length === 1
          ? [n]
          : depth === 1
            ? [n, rows.length]
            : [n, depth, rows.length / depth];
    return {
      type: 'image',
      index,
      name,
      header: headerOf(cards),
      bitpix: -64,
      axes,
      rowCount: rows.length,
      readRows: (first, count) =>
        Float64Array.from(rows.slice(first, first + count).flatMap((row) => Array.from(row))),
    };
  };
}

/** A column of numbers (one per row), texts, or vectors (one array per row). */
export interface MadeColumn {
  readonly name: string;
  readonly unit?: string;
  readonly ucd?: string;
  readonly values: readonly (number | string | bigint | readonly number[] | Float64Array)[];
}

/** A table HDU. */
export function table(
  name: string,
  columns: readonly MadeColumn[],
  cards: Readonly<Record<string, CardValue>> = {},
): HduMaker {
  return (index): TableHdu => {
    const at = (column: number, row: number) => columns[column]!.values[row]!;
    const numbers = (column: number, row: number): number[] => {
      const value = at(column, row);
      return typeof value === 'object' ? Array.from(value) : [Number(value)];
    };
    const each =
      <T>(turn: (value: MadeColumn['values'][number]) => T) =>
      (column: number, first: number, count: number) =>
        Array.from({ length: count }, (_, i) => turn(at(column, first + i)));
    return {
      type: 'table',
      index,
      name,
      header: headerOf(cards),
      rowCount: columns[0]!.values.length,
      columns: columns.map(describeColumn),
      readNumbers: (column, first, count) =>
        Float64Array.from(Array.from({ length: count }, (_, i) => numbers(column, first + i)).flat()),
      readIntegers: each((value) => BigInt(value as number)),
      readStrings: each(String),
      readLogicals: each(Boolean),
      readBits: each(String),
      readCell: (column, row) => Float64Array.from(numbers(column, row)),
    };
  };
}

function describeColumn({ name, unit, ucd, values }: MadeColumn): TableColumn {
  const first = values[0];
  const repeat = typeof first === 'object' ? first.length : typeof first === 'string' ? 16 : 1;
  const code = typeof first === 'string' ? 'A' : typeof first === 'bigint' ? 'K' : 'D';
  return { name, unit: unit ?? '', ucd: ucd ?? '', code, repeat, shape: [repeat] };
}

/** An opened FITS file of the HDUs, in order from HDU 0. */
export function openedFile(...makers: readonly HduMaker[]): OpenedInput {
  const file: FitsFile = {
    label: 'made.fits',
    hdus: makers.map((make, index) => make(index)),
    fault: null,
    trailingBytes: 0,
  };
  return { kind: 'fits', file, limits: DEFAULT_READ_LIMITS };
}

/** A primary HDU without data. */
export function emptyPrimary(cards: Readonly<Record<string, CardValue>> = {}): HduMaker {
  return image('', [], cards);
}
