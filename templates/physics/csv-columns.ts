/** A parsed table: the names of its columns and its rows of text. */
export interface CsvTable {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/**
 * Splits the plain tables of templates/data: comma-separated, `#` lines are remarks, the first other line
 * names the columns, no quoting.
 * @throws RangeError when a row has another number of cells than the header.
 */
export function parseCsv(text: string): CsvTable {
  const lines = text
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '' && !line.startsWith('#'));
  const columns = (lines[0] ?? '').split(',');
  const rows = lines.slice(1).map((line) => line.split(','));
  for (const row of rows) {
    if (row.length !== columns.length) {
      throw new RangeError(`a row must have ${columns.length} cells, got ${row.length}: ${row.join(',')}`);
    }
  }
  return { columns, rows };
}

/**
 * One numeric column of a table.
 * @throws RangeError when the column is missing or a cell is not a number (an empty cell reads as NaN).
 */
export function numberColumn(table: CsvTable, name: string): Float64Array {
  return Float64Array.from(textColumn(table, name), (cell) => {
    const value = cell === '' ? NaN : Number(cell);
    if (cell !== '' && Number.isNaN(value)) {
      throw new RangeError(`column ${name} must hold numbers, got ${cell}`);
    }
    return value;
  });
}

/**
 * One text column of a table.
 * @throws RangeError when the column is missing.
 */
export function textColumn(table: CsvTable, name: string): string[] {
  const at = table.columns.indexOf(name);
  if (at < 0) {
    throw new RangeError(`column must be one of ${table.columns.join(' ')}, got ${name}`);
  }
  return table.rows.map((row) => row[at] ?? '');
}
