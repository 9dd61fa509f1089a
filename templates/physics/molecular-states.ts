import { SECOND_RADIATION } from './constants.ts';
import { numberColumn, parseCsv, textColumn } from './csv-columns.ts';
import type { StateConstants } from './molecular-bands.ts';

/** One low electronic state of a molecule. */
export interface MolecularState extends StateConstants {
  readonly molecule: string;
  /** Energy above the ground state, cm^-1. */
  readonly term: number;
  readonly weight: number;
  /** 2 for molecules of equal nuclei, else 1. */
  readonly symmetry: number;
}

/**
 * Reads the text of templates/data/molecular-states.csv.
 * @throws RangeError when a cell is not a number.
 */
export function parseMolecularStates(text: string): readonly MolecularState[] {
  const table = parseCsv(text);
  const column = (name: string): Float64Array => numberColumn(table, name);
  const term = column('term');
  const weight = column('weight');
  const we = column('we');
  const wexe = column('wexe');
  const rotation = column('B');
  const alpha = column('alpha');
  const symmetry = column('symmetry');
  return textColumn(table, 'molecule').map((molecule, row) => ({
    molecule,
    term: term[row]!,
    weight: weight[row]!,
    we: we[row]!,
    wexe: wexe[row]!,
    rotation: rotation[row]!,
    alpha: alpha[row]!,
    symmetry: symmetry[row]!,
  }));
}

/** Vibrational states summed; the energies of a Morse potential turn over before or are unpopulated. */
const VIBRATIONS = 25;

/**
 * Internal partition function of a molecule at a temperature in kelvin, measured from v = 0, J = 0 of its
 * ground state: the sum over the listed electronic states and their vibrations, with the rotational sum
 * kT/(hcB) (1 + 2 D kT / (hc B^2)) (Herzberg 1950). 0 for a molecule without states.
 */
export function molecularPartition(
  states: readonly MolecularState[],
  molecule: string,
  temperature: number,
): number {
  const thermal = temperature / SECOND_RADIATION;
  let sum = 0;
  for (const state of states) {
    if (state.molecule !== molecule) {
      continue;
    }
    let last = -1;
    for (let v = 0; v < VIBRATIONS; v += 1) {
      const energy = state.we * v - state.wexe * v * (v + 1);
      const b = state.rotation - state.alpha * (v + 0.5);
      if (energy <= last || b <= 0) {
        break;
      }
      last = energy;
      const distortion = (4 * b ** 3) / state.we ** 2;
      const rotational = (thermal / b) * (1 + (2 * distortion * thermal) / (b * b));
      sum += (state.weight / state.symmetry) * rotational * Math.exp(-(state.term + energy) / thermal);
    }
  }
  return sum;
}
