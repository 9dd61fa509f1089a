import { BOLTZMANN } from './constants.ts';
import { numberColumn, parseCsv, textColumn } from './csv-columns.ts';
import { interpolateClamped } from './interpolate.ts';

/** Dissociation constants of diatomic molecules on a common temperature table. */
export interface MoleculeEquilibrium {
  /** Natural logarithm of the temperatures, ascending. */
  readonly lnTemperatures: Float64Array;
  /** log10 of p(A) p(B) / p(AB) in pascal, by molecule. */
  readonly byMolecule: ReadonlyMap<string, Float64Array>;
}

const DYNE_PER_PASCAL = 10;

/**
 * Reads the text of templates/data/molecule-equilibrium.csv.
 * @throws RangeError when a cell is not a number.
 */
export function parseMoleculeEquilibrium(text: string): MoleculeEquilibrium {
  const table = parseCsv(text);
  const names = table.columns.slice(1);
  const columns = names.map((name) => numberColumn(table, name));
  const byMolecule = new Map<string, Float64Array>();
  for (const [row, molecule] of textColumn(table, 'molecule').entries()) {
    byMolecule.set(
      molecule,
      Float64Array.from(columns, (column) => column[row]!),
    );
  }
  return { lnTemperatures: Float64Array.from(names, (name) => Math.log(Number(name))), byMolecule };
}

/**
 * n(A) n(B) / n(AB) in cm^-3 at a temperature in kelvin; the table is interpolated in ln T, where it is
 * smooth, and held constant outside 1000-10000 K.
 * @throws RangeError for a molecule that is not in the table.
 */
export function dissociationConstant(
  table: MoleculeEquilibrium,
  molecule: string,
  temperature: number,
): number {
  const values = table.byMolecule.get(molecule);
  if (!values) {
    throw new RangeError(`molecule must be in the equilibrium table, got ${molecule}`);
  }
  const logPascal = interpolateClamped(table.lnTemperatures, values, Math.log(temperature));
  return (10 ** logPascal * DYNE_PER_PASCAL) / (BOLTZMANN * temperature);
}
