import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { cellOf } from './cell.ts';
import { COLUMNS } from './columns.ts';
import { shortestDecimal } from './shortest-decimal.ts';

/**
 * The catalogue as CSV (RFC 4180 quoting, but LF line ends): comments, a header row, one row per spectrum.
 * Empty = missing. Numbers are the shortest decimals that read back to the same value.
 *
 * @param comments lines put before the header, each behind `# `
 */
export function catalogueCsv(rows: readonly CatalogueRow[], comments: readonly string[] = []): string {
  const lines = comments.flatMap((comment) => comment.split(/\r\n|\r|\n/).map((line) => `# ${line}`));
  lines.push(COLUMNS.map((column) => column.name).join(','));
  for (const row of rows) {
    lines.push(
      COLUMNS.map((column) => {
        const cell = cellOf(row, column);
        if (cell === null) return '';
        if (typeof cell === 'number') return shortestDecimal(cell, column.type);
        return typeof cell === 'boolean' ? String(cell) : quoted(cell);
      }).join(','),
    );
  }
  return `${lines.join('\n')}\n`;
}

/**
 * Quotes where RFC 4180 asks for it, and around a leading `#`, which readers that know comments would drop, and
 * around outer blanks, which some readers trim.
 */
function quoted(text: string): string {
  return /[",\r\n]|^#|^\s|\s$/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
