import { asciiText, encodeFits } from '../../pipeline/encode/index.ts';
import type { CardSpec, ColumnSpec } from '../../pipeline/encode/index.ts';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { cellOf } from './cell.ts';
import { COLUMNS } from './columns.ts';
import type { Column } from './columns.ts';

/**
 * The catalogue as a FITS 4.0 binary table. Missing = NaN, the declared TNULL, or an empty string. UCDs stand in
 * TUCDn and meanings in TCOMMn (common conventions outside the standard).
 *
 * FITS text is printable ASCII only. Whatever else a text from outside holds is written as JavaScript escapes,
 * `\u00e9`, a backslash as two, and a last blank, which FITS would drop, as `\u0020`, so that no two names become one. Every row of a FITS column is as wide as its
 * longest text: texts other than identities are cut, or one absurd remark would swell the file a thousandfold. The
 * other three formats carry them whole.
 *
 * @param facts header cards of the table: night, recipe and the like
 */
export function catalogueFits(
  rows: readonly CatalogueRow[],
  facts: readonly CardSpec[] = [],
): Uint8Array<ArrayBuffer> {
  return encodeFits([
    {
      type: 'table',
      name: 'CATALOGUE',
      rowCount: rows.length,
      columns: COLUMNS.map((column) => columnSpec(rows, column)),
      cards: [
        { keyword: 'RADESYS', value: 'ICRS', comment: 'frame of ra and dec' },
        { keyword: 'TIMESYS', value: 'UTC', comment: 'time scale of ISO 8601 columns' },
        ...facts,
        {
          keyword: 'COMMENT',
          text: 'Characters outside printable ASCII are written as \\uXXXX, a backslash as two.',
        },
      ],
    },
  ]);
}

function columnSpec(rows: readonly CatalogueRow[], column: Column): ColumnSpec {
  const about = {
    name: column.name,
    unit: column.unit,
    ucd: column.ucd,
    description: asciiText(column.meaning),
    ...(column.decimals === undefined ? {} : { display: `F${DISPLAY_WIDTH}.${column.decimals}` }),
  };
  const cells = rows.map((row) => cellOf(row, column));
  // cellOf has checked every cell against the column's type.
  switch (column.type) {
    case 'word':
    case 'text':
      return {
        ...about,
        type: 'string',
        values: (cells as (string | null)[]).map((cell) =>
          cell === null ? null : escapedAscii(cell, IDENTITIES.has(column.name) ? Infinity : LONGEST_TEXT),
        ),
      };
    case 'int':
      return { ...about, type: 'int32', values: cells as (number | null)[] };
    case 'float':
      return { ...about, type: 'float32', values: cells as (number | null)[] };
    case 'double':
      return { ...about, type: 'float64', values: cells as (number | null)[] };
    case 'boolean':
      return { ...about, type: 'logical', values: cells as (boolean | null)[] };
  }
}

/** Wide enough for every column: sign, six digits, point, six decimals. */
const DISPLAY_WIDTH = 14;

/** Columns that name a row or a file: never cut. */
const IDENTITIES: ReadonlySet<Column['name']> = new Set(['spectrum_id', 'input_file']);
/** Printable ASCII without the backslash: needs no escape. */
const PLAIN = /^[ -[\]-~]*$/;
/** Characters kept of any other text; names and remarks of real surveys stay far below. */
const LONGEST_TEXT = 400;

/**
 * Text in printable ASCII from which the original can be had back; astral characters become two escapes.
 *
 * @param longest characters of the result at most, not counting the escape of a last blank; the cut never falls inside an escape
 */
export function escapedAscii(text: string, longest: number): string {
  // Nearly every text is plain: a night has a hundred thousand of them.
  if (PLAIN.test(text)) return text.slice(0, longest).replace(LAST_BLANK, BLANK_ESCAPE);
  const pieces = Array.from({ length: text.length }, (_, i) => escapedUnit(text, i));
  let length = 0;
  const end = pieces.findIndex((piece) => (length += piece.length) > longest);
  return (end === -1 ? pieces : pieces.slice(0, end)).join('').replace(LAST_BLANK, BLANK_ESCAPE);
}

const LAST_BLANK = / $/;
const BLANK_ESCAPE = '\\u0020';

function escapedUnit(text: string, index: number): string {
  const unit = text.charAt(index);
  if (unit === '\\') return '\\\\';
  return /[ -~]/.test(unit) ? unit : `\\u${text.charCodeAt(index).toString(16).padStart(4, '0')}`;
}
