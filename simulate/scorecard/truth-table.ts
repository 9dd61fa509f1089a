import { KINDS, type Kind } from '../../templates/family.ts';
import { type CsvRow, numberIn, readCsv } from './csv-table.ts';

/** What is known about one spectrum. */
export interface TruthRow {
  readonly file: string;
  /** Row inside the file; null when the table does not say. */
  readonly row: number | null;
  /** Target name; empty when the file holds one spectrum. */
  readonly select: string;
  /** `none`: nothing to be found here; null: not known. */
  readonly kind: Kind | 'none' | null;
  readonly redshift: number | null;
  /** False for references that are doubtful or unknown. */
  readonly isSure: boolean;
  readonly group: string;
}

/** Names a truth table may use for the same thing, first the one `shiftwork simulate` writes. */
const NAMES = {
  file: ['file', 'input_file'],
  row: ['row', 'input_row'],
  select: ['select', 'target_name'],
} as const;

/**
 * Reads a truth table: CSV with `file`, `kind`, `redshift`, and as far as they are needed `row`, `select`
 * (target name), `reference_trust` (`sure` when absent) and `group`.
 *
 * @throws RangeError when a needed column is missing or a kind is not one of galaxy, quasar, star, none, empty
 */
export function readTruth(text: string): TruthRow[] {
  return readCsv(text).map((row) => {
    const file = cell(row, NAMES.file);
    if (file === null) throw new RangeError('a truth table must have a column file, got none');
    const trust = row.get('reference_trust') ?? 'sure';
    return {
      file,
      row: numberIn(row, row.has('row') ? 'row' : 'input_row'),
      select: cell(row, NAMES.select) ?? '',
      kind: kindOf(row),
      redshift: numberIn(row, 'redshift'),
      isSure: trust === 'sure',
      group: row.get('group') ?? '',
    };
  });
}

function cell(row: CsvRow, names: readonly string[]): string | null {
  for (const name of names) if (row.has(name)) return row.get(name)!;
  return null;
}

function kindOf(row: CsvRow): TruthRow['kind'] {
  const text = row.get('kind');
  if (text === undefined) throw new RangeError('a truth table must have a column kind, got none');
  if (text === '') return null;
  const kind = ([...KINDS, 'none'] as const).find((known) => known === text);
  if (kind === undefined)
    throw new RangeError(`kind must be galaxy, quasar, star, none or empty, got ${text}`);
  return kind;
}
