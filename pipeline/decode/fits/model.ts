/** Value of one header card: string, number, logical; `bigint` for integers beyond 2^53; null = undefined value. */
export type CardValue = string | number | boolean | bigint | null;

/** A parsed header. Keywords are upper case; HIERARCH keys keep their words joined by single spaces. */
export interface Header {
  /** First value of a keyword, CONTINUE already joined; undefined when absent. */
  get(keyword: string): CardValue | undefined;
  /** All keywords with a value, in file order. */
  keys(): readonly string[];
  /** COMMENT, HISTORY and blank-keyword texts in file order. */
  readonly comments: readonly string[];
}

export interface TableColumn {
  /** TTYPE as written; empty when the column has no name. */
  readonly name: string;
  readonly unit: string;
  readonly ucd: string;
  /** FITS type letter: L X B I J K A E D C M P Q. */
  readonly code: string;
  /** Elements per cell (0 allowed); for P and Q the maximum declared, or 0. */
  readonly repeat: number;
  /** Cell shape, first axis fastest, from TDIM; [repeat] when absent. */
  readonly shape: readonly number[];
  /** Element type letter of a P or Q column. */
  readonly elementCode?: string;
}

/** Numbers of one cell or image row range: scaled to physical values, missing = NaN. */
export type Numbers = Float64Array;

interface HduBase {
  readonly index: number;
  /** EXTNAME, trimmed; empty when absent. */
  readonly name: string;
  readonly header: Header;
}

/** An image HDU. axes[0] is NAXIS1, the fastest. */
export interface ImageHdu extends HduBase {
  readonly type: 'image';
  readonly bitpix: number;
  readonly axes: readonly number[];
  /** Rows of axes[0] pixels: the product of axes 2..n; 1 for a one-dimensional image, 0 without data. */
  readonly rowCount: number;
  /**
   * Rows `first .. first+count-1` of the image flattened to (product of axes 2..n) rows of axes[0] pixels,
   * as physical values (BSCALE, BZERO applied; BLANK and NaN become NaN). Reads only those bytes.
   */
  readRows(first: number, count: number): Numbers;
}

/** A binary (or ASCII) table HDU. */
export interface TableHdu extends HduBase {
  readonly type: 'table';
  readonly rowCount: number;
  readonly columns: readonly TableColumn[];
  /** Numeric column over a row range, `count * repeat` values; complex columns give pairs. NaN = missing. */
  readNumbers(column: number, first: number, count: number): Numbers;
  /** Integer column exact to 64 bits; null = TNULL. One element per row. */
  readIntegers(column: number, first: number, count: number): (bigint | null)[];
  /** Character column, trailing blanks removed; also numbers and logicals as text. */
  readStrings(column: number, first: number, count: number): string[];
  /** Logical column; null = undefined. */
  readLogicals(column: number, first: number, count: number): (boolean | null)[];
  /** Bit column as strings of 0 and 1. */
  readBits(column: number, first: number, count: number): string[];
  /** One cell of a fixed or variable-length numeric column. */
  readCell(column: number, row: number): Numbers;
}

/** An HDU that is skipped over but not understood; `reason` says why. */
export interface OtherHdu extends HduBase {
  readonly type: 'other';
  readonly reason: string;
}

export type Hdu = ImageHdu | TableHdu | OtherHdu;

export interface FitsFile {
  readonly label: string;
  readonly hdus: readonly Hdu[];
  /** Set when the walk had to stop before the end of the file (HDUs before it are usable). */
  readonly fault: Error | null;
  /** Bytes after the last HDU that begin no further HDU: padding, or junk that is passed over. */
  readonly trailingBytes: number;
}
