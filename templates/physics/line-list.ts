import { numberColumn, parseCsv } from './csv-columns.ts';
import type { CsvTable } from './csv-columns.ts';
import type { Element } from './elements.ts';
import { atomicDamping } from './line-damping.ts';
import { listedToVacuum } from './refraction.ts';

/** One absorber of a line list: an ion or a molecule. */
export interface Species {
  /** `Fe I`-like key for ions is number and ion; molecules have a name. */
  readonly kind: 'ion' | 'molecule';
  readonly number: number;
  readonly ion: number;
  readonly molecule: string;
}

/** Spectral lines as columns, ascending in wavelength. */
export interface LineList {
  readonly length: number;
  readonly species: readonly Species[];
  /** Vacuum, angstrom. */
  readonly wavelength: Float64Array;
  /** Index into `species`. */
  readonly speciesIndex: Uint16Array;
  /** Energy of the lower level, eV. */
  readonly energyEv: Float32Array;
  readonly gf: Float32Array;
  /** Widths, see Damping. */
  readonly radiative: Float32Array;
  readonly vanDerWaals: Float32Array;
  readonly stark: Float32Array;
}

/** One line before the columns are made. */
export interface Line {
  readonly species: Species;
  readonly wavelength: number;
  readonly energyEv: number;
  readonly gf: number;
  readonly radiative: number;
  readonly vanDerWaals: number;
  readonly stark: number;
}

/** Key that tells species apart. */
const speciesKey = (s: Species): string => `${s.molecule}:${s.number}:${s.ion}`;

/** Orders lines by wavelength and stores them as columns. */
export function toLineList(lines: readonly Line[]): LineList {
  const sorted = [...lines].sort((a, b) => a.wavelength - b.wavelength);
  const species: Species[] = [];
  const indexByKey = new Map<string, number>();
  const speciesIndex = Uint16Array.from(sorted, (line) => {
    const key = speciesKey(line.species);
    let index = indexByKey.get(key);
    if (index === undefined) {
      index = species.length;
      species.push(line.species);
      indexByKey.set(key, index);
    }
    return index;
  });
  return {
    length: sorted.length,
    species,
    wavelength: Float64Array.from(sorted, (line) => line.wavelength),
    speciesIndex,
    energyEv: Float32Array.from(sorted, (line) => line.energyEv),
    gf: Float32Array.from(sorted, (line) => line.gf),
    radiative: Float32Array.from(sorted, (line) => line.radiative),
    vanDerWaals: Float32Array.from(sorted, (line) => line.vanDerWaals),
    stark: Float32Array.from(sorted, (line) => line.stark),
  };
}

/** An ion as a species. */
const ion = (number: number, stage: number): Species => ({ kind: 'ion', number, ion: stage, molecule: '' });

/**
 * Atomic lines from a comma-separated list whose columns are, in this order, air wavelength in angstrom
 * (vacuum below 2000), atomic number, ion (0 = neutral), lower energy in eV, log gf. Lines of elements that
 * are not in `elements`, and of ions above the first, are left out.
 * @throws RangeError when a cell is not a number or there are fewer than five columns.
 */
export function parseAtomicLines(text: string, elements: ReadonlyMap<number, Element>): Line[] {
  const table = parseCsv(text);
  const [wavelength, number, stage, energy, logGf] = table.columns
    .slice(0, 5)
    .map((name) => numberColumn(table, name));
  if (!wavelength || !number || !stage || !energy || !logGf) {
    throw new RangeError(`a line list must have five columns, got ${table.columns.length}`);
  }
  const lines: Line[] = [];
  for (let row = 0; row < wavelength.length; row += 1) {
    const element = elements.get(number[row]!);
    const ionisationEv = element?.ionisationEv[stage[row]!];
    if (!element || ionisationEv === undefined || stage[row]! > 1) {
      continue;
    }
    const damping = atomicDamping(
      {
        wavelength: wavelength[row]!,
        number: element.number,
        ion: stage[row]!,
        energyEv: energy[row]!,
        logGf: logGf[row]!,
      },
      ionisationEv,
    );
    lines.push({
      species: ion(element.number, stage[row]!),
      wavelength: listedToVacuum(wavelength[row]!),
      energyEv: energy[row]!,
      gf: 10 ** logGf[row]!,
      ...damping,
    });
  }
  return lines;
}

/** Radiative and van der Waals widths of helium lines: the upper levels decay fast. Order of magnitude. */
const HELIUM_RADIATIVE = [1e8, 1e9];
const HELIUM_VAN_DER_WAALS = 3e-8;

/**
 * Helium lines from the text of templates/data/helium-lines.csv, with their own Stark widths.
 * @throws RangeError when a cell is not a number.
 */
export function parseHeliumLines(text: string): Line[] {
  const table: CsvTable = parseCsv(text);
  const wavelength = numberColumn(table, 'wavelength');
  const stage = numberColumn(table, 'ion');
  const energy = numberColumn(table, 'energy');
  const logGf = numberColumn(table, 'loggf');
  const stark = numberColumn(table, 'stark');
  return Array.from(wavelength, (_, row) => ({
    species: ion(2, stage[row]!),
    wavelength: listedToVacuum(wavelength[row]!),
    energyEv: energy[row]!,
    gf: 10 ** logGf[row]!,
    radiative: HELIUM_RADIATIVE[stage[row]!]!,
    vanDerWaals: HELIUM_VAN_DER_WAALS,
    stark: stark[row]!,
  }));
}
