/** A header card to write. Keywords: up to 8 of A-Z, 0-9, `_`, `-`. Text must be printable ASCII. */
export type CardSpec =
  | {
      readonly keyword: string;
      /** null = a card without a value; a string of any length goes on in CONTINUE cards. */
      readonly value: string | number | boolean | bigint | null;
      /** Cut off where the card ends. */
      readonly comment?: string;
    }
  | {
      readonly keyword: 'COMMENT' | 'HISTORY';
      /** Of any length; broken over as many cards as it takes. */
      readonly text: string;
    };

/** Pixels of an image; the array class decides how they are stored (BITPIX 8, 16, 32, -32, -64). */
export type Pixels = Uint8Array | Int16Array | Int32Array | Float32Array | Float64Array;

/** An image HDU. Without axes it is an HDU that has a header only. */
export interface ImageSpec {
  readonly type: 'image';
  /** EXTNAME. */
  readonly name?: string;
  /** Axis lengths, fastest first. */
  readonly axes: readonly number[];
  /** As many as the product of the axes; none without axes. */
  readonly pixels?: Pixels;
  /** BUNIT. */
  readonly unit?: string;
  readonly cards?: readonly CardSpec[];
}

interface ColumnBase {
  /** TTYPE. */
  readonly name: string;
  /** TUNIT. */
  readonly unit?: string;
  /** UCD1+ words, written as TUCD. */
  readonly ucd?: string;
  /** What the column means, written as TCOMM. */
  readonly description?: string;
  /** TDISP. */
  readonly display?: string;
}

/** A column of a binary table. `null` is a missing value; how it is stored stands at each type. */
export type ColumnSpec =
  /** Missing: byte 0. */
  | (ColumnBase & { readonly type: 'logical'; readonly values: readonly (boolean | null)[] })
  /** Missing: `missing` (default the lowest int32), declared as TNULL. */
  | (ColumnBase & {
      readonly type: 'int32';
      readonly values: Int32Array | readonly (number | null)[];
      readonly missing?: number;
    })
  /** Missing: `missing` (default the lowest int64), declared as TNULL. */
  | (ColumnBase & {
      readonly type: 'int64';
      readonly values: BigInt64Array | readonly (bigint | null)[];
      readonly missing?: bigint;
    })
  /** Missing: NaN. With `repeat` the cells are vectors and `values` runs along the rows. */
  | (ColumnBase & {
      readonly type: 'float32' | 'float64';
      readonly values: Float32Array | Float64Array | readonly (number | null)[];
      /** Numbers per cell; default 1. */
      readonly repeat?: number;
    })
  /** Missing: empty. Cells are as long as the longest value, or `length` characters. */
  | (ColumnBase & {
      readonly type: 'string';
      readonly values: readonly (string | null)[];
      readonly length?: number;
    });

/** A binary table HDU. */
export interface TableSpec {
  readonly type: 'table';
  /** EXTNAME. */
  readonly name?: string;
  readonly rowCount: number;
  readonly columns: readonly ColumnSpec[];
  readonly cards?: readonly CardSpec[];
}

export type HduSpec = ImageSpec | TableSpec;
