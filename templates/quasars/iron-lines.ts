import { numberColumn, parseCsv } from '../physics/csv-columns.ts';
import { listedToVacuum } from '../physics/refraction.ts';
import type { IronLine } from './iron.ts';

const IRON = 26;
const SINGLY_IONISED = 1;

/**
 * The Fe II lines of a line list: comma-separated; columns in this order: wavelength in air (Å, vacuum below
 * 2000), atomic number, ion (0 = neutral), lower energy (eV), log gf. The same list the stars are made from.
 *
 * @throws RangeError when there are fewer than five columns, a cell is not a number, or no line is Fe II
 */
export function ironLinesOf(text: string): IronLine[] {
  const table = parseCsv(text);
  const [wavelength, number, ion, energy, logGf] = table.columns
    .slice(0, 5)
    .map((name) => numberColumn(table, name));
  if (!wavelength || !number || !ion || !energy || !logGf) {
    throw new RangeError(`a line list must have five columns, got ${table.columns.length}`);
  }
  const lines: IronLine[] = [];
  for (let row = 0; row < wavelength.length; row++) {
    if (number[row] !== IRON || ion[row] !== SINGLY_IONISED) continue;
    lines.push({
      wavelength: listedToVacuum(wavelength[row]!),
      energyEv: energy[row]!,
      gf: 10 ** logGf[row]!,
    });
  }
  if (lines.length === 0) throw new RangeError('a line list must hold lines of Fe II, got none');
  return lines;
}
