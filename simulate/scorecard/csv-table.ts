/** A table read from CSV: the cells of a row by column name, all text. */
export type CsvRow = ReadonlyMap<string, string>;

/**
 * Reads CSV (RFC 4180: quotes doubled inside quotes, line ends inside them allowed) with a header row. Lines
 * before the header that begin with `#` are comments; empty lines are passed over.
 *
 * @throws RangeError naming the line when a row has another number of cells than the header, or a quote is
 *   never closed
 */
export function readCsv(text: string): CsvRow[] {
  const records = recordsOf(text);
  const header = records.shift();
  if (header === undefined) throw new RangeError('the table must have a header row, got none');
  return records.map(({ cells, line }) => {
    if (cells.length !== header.cells.length) {
      throw new RangeError(`line ${line} must have ${header.cells.length} cells, got ${cells.length}`);
    }
    return new Map(header.cells.map((name, c) => [name, cells[c]!]));
  });
}

interface CsvRecord {
  readonly cells: readonly string[];
  /** Where it begins, from 1. */
  readonly line: number;
}

/** One cell and what ends it: a quoted text, or everything up to the next comma or line end. */
const CELL = /(?:"((?:[^"]|"")*)"|([^,"\r\n]*))(,|\r\n|\n|\r|$)/y;

function recordsOf(text: string): CsvRecord[] {
  const records: CsvRecord[] = [];
  const start = text.startsWith('\uFEFF') ? 1 : 0;
  let line = 1;
  CELL.lastIndex = start;
  while (CELL.lastIndex < text.length) {
    if (records.length === 0 && text[CELL.lastIndex] === '#') {
      const end = text.indexOf('\n', CELL.lastIndex);
      CELL.lastIndex = end < 0 ? text.length : end + 1;
      line++;
      continue;
    }
    const cells: string[] = [];
    const first = line;
    for (let ended = false; !ended; ) {
      const match = CELL.exec(text);
      if (match === null) throw new RangeError(`line ${line} must close its quotes, got none`);
      const [whole, quoted, plain = '', end = ''] = match;
      cells.push(quoted === undefined ? plain : quoted.replaceAll('""', '"'));
      line += whole.split(/\r\n|\n|\r/).length - 1;
      ended = end !== ',';
    }
    if (cells.length > 1 || cells[0] !== '') records.push({ cells, line: first });
  }
  return records;
}

/** A cell as a number; null when empty, absent or no number. */
export function numberIn(row: CsvRow, column: string): number | null {
  const text = row.get(column) ?? '';
  const value = Number(text);
  return text === '' || !Number.isFinite(value) ? null : value;
}
