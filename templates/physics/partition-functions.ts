import { numberColumn, parseCsv, textColumn } from './csv-columns.ts';
import { interpolateClamped } from './interpolate.ts';

/** Partition functions of atoms and ions on a common temperature table. */
export interface PartitionFunctions {
  /** Ascending, kelvin. */
  readonly temperatures: Float64Array;
  /** By species name such as `Fe II`. */
  readonly bySpecies: ReadonlyMap<string, Float64Array>;
}

const STAGE_NAMES = ['I', 'II', 'III'];

/** Columns of the table that hold temperatures are named by a number. */
const isTemperature = (name: string): boolean => /^\d+$/.test(name);

/**
 * Reads the text of templates/data/partition-functions.csv.
 * @throws RangeError when a cell is not a number.
 */
export function parsePartitionFunctions(text: string): PartitionFunctions {
  const table = parseCsv(text);
  const names = table.columns.filter(isTemperature);
  const columns = names.map((name) => numberColumn(table, name));
  const bySpecies = new Map<string, Float64Array>();
  for (const [row, species] of textColumn(table, 'species').entries()) {
    bySpecies.set(
      species,
      Float64Array.from(columns, (column) => column[row]!),
    );
  }
  return { temperatures: Float64Array.from(names, Number), bySpecies };
}

/**
 * Partition function of one ionisation stage (0 = neutral, at most 2) at a temperature in kelvin, linear in
 * temperature as in the source table and constant outside it (2000-10000 K), where it is an approximation.
 * Absent (undefined) for species that are not in the table.
 */
export function partitionFunction(
  table: PartitionFunctions,
  symbol: string,
  stage: number,
  temperature: number,
): number | undefined {
  const values = table.bySpecies.get(`${symbol} ${STAGE_NAMES[stage] ?? ''}`);
  return values && interpolateClamped(table.temperatures, values, temperature);
}
