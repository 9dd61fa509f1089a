/** Rows per statement: 45 columns of them stay under the 32,766 values SQLite binds and pg's 65,535. */
const ROWS_PER_STATEMENT = 500;

/** Cuts rows into pieces that one statement can carry; nothing for an empty list. */
export function* inBatches<T>(rows: readonly T[]): Generator<T[]> {
  for (let first = 0; first < rows.length; first += ROWS_PER_STATEMENT) {
    yield rows.slice(first, first + ROWS_PER_STATEMENT);
  }
}
