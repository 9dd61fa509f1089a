import { plainName } from './array-kind.ts';
import type { FitsFile, TableHdu } from './fits/model.ts';
import type { ExposureTable, TargetColumns } from './layout.ts';
import type { Recognition } from './recognition.ts';
import { countFound, targetColumnsOf } from './target-columns.ts';

/** Which tables say what the spectra are of. */
export interface TargetTables {
  readonly targetsHdu: number | null;
  readonly targetColumns: TargetColumns | null;
  readonly exposures: ExposureTable | null;
  readonly recognised: readonly string[];
  readonly missing: readonly string[];
}

/**
 * Find the table with one row per spectrum that knows most about them (name, position, fibre, role, magnitude), and a
 * table with a row per exposure that shares its name column.
 */
export function recogniseTargets(file: FitsFile, recognition: Recognition): TargetTables {
  const spectraHdu = recognition.arms[0]!.flux.hdu;
  const tables = file.hdus.filter((hdu): hdu is TableHdu => hdu.type === 'table');
  const best = tables
    .filter((table) => table.rowCount === recognition.rowCount)
    .filter((table) => recognition.form === 'table-row-per-spectrum' || table.index !== spectraHdu)
    .map((table) => ({ table, columns: targetColumnsOf(table) }))
    .filter(({ columns }) => countFound(columns) > 0)
    .sort((a, b) => countFound(b.columns) - countFound(a.columns) || a.table.index - b.table.index)[0];
  if (best === undefined) {
    const missing = recognition.rowCount > 1 ? ['no table names the targets'] : [];
    return { targetsHdu: null, targetColumns: null, exposures: null, recognised: [], missing };
  }
  const { table, columns } = best;
  const words = Object.entries(columns)
    .filter(([, column]) => column !== null)
    .map(([part, column]) => `${part} from '${String(column)}'`);
  const recognised = [`targets from HDU ${table.index} '${table.name}': ${words.join(', ')}`];
  const exposures = columns.name === null ? null : exposureTable(tables, table, columns.name);
  if (exposures !== null) recognised.push(`exposures of each spectrum from HDU ${exposures.hdu}`);
  return { targetsHdu: table.index, targetColumns: columns, exposures, recognised, missing: [] };
}

function exposureTable(
  tables: readonly TableHdu[],
  targets: TableHdu,
  nameColumn: string,
): ExposureTable | null {
  for (const table of tables) {
    if (table === targets) continue;
    const column = (pattern: RegExp): string | null =>
      table.columns.find(({ name, repeat }) => repeat === 1 && pattern.test(plainName(name)))?.name ?? null;
    const targetColumn = table.columns.find(({ name }) => plainName(name) === plainName(nameColumn))?.name;
    const mjdColumn = column(/^mjd(_(avg|mid|obs|beg|start))?$/);
    if (targetColumn === undefined || mjdColumn === null) continue;
    return { hdu: table.index, targetColumn, mjdColumn, durationColumn: column(/^(x|exp)(tim|posur)\w*$/) };
  }
  return null;
}
