import { WAVENUMBER_PER_EV } from './constants.ts';
import { numberColumn, parseCsv, textColumn } from './csv-columns.ts';
import type { Line, Species } from './line-list.ts';
import { equilibriumDistance, franckCondon } from './morse.ts';

/** Vibration-rotation constants of one electronic state, cm^-1. */
export interface StateConstants {
  readonly we: number;
  readonly wexe: number;
  readonly rotation: number;
  readonly alpha: number;
}

/** One sub-band system of a diatomic molecule: a row of templates/data/band-systems.csv. */
export interface BandSystem {
  readonly system: string;
  readonly molecule: string;
  /** u. */
  readonly reducedMass: number;
  /** Energy of the lower electronic state above the ground state, cm^-1. */
  readonly lowerTerm: number;
  /** Energy of the sub-level above that, cm^-1. */
  readonly offset: number;
  readonly lower: StateConstants;
  readonly upper: StateConstants;
  /** Wavenumber between v = 0 of both states, without rotation, cm^-1. */
  readonly origin: number;
  /** Electronic statistical weight of the sub-level. */
  readonly weight: number;
  readonly oscillatorStrength: number;
  readonly type: 'parallel' | 'perpendicular';
}

/**
 * Reads the text of templates/data/band-systems.csv.
 * @throws RangeError when a cell is not a number.
 */
export function parseBandSystems(text: string): readonly BandSystem[] {
  const table = parseCsv(text);
  const column = (name: string): Float64Array => numberColumn(table, name);
  const columns = {
    mass: column('reducedMass'),
    term: column('lowerTerm'),
    lowerWe: column('lowerWe'),
    lowerWexe: column('lowerWexe'),
    lowerB: column('lowerB'),
    lowerAlpha: column('lowerAlpha'),
    upperWe: column('upperWe'),
    upperWexe: column('upperWexe'),
    upperB: column('upperB'),
    upperAlpha: column('upperAlpha'),
    origin: column('origin'),
    offset: column('offset'),
    weight: column('weight'),
    f: column('f'),
  };
  const molecules = textColumn(table, 'molecule');
  const types = textColumn(table, 'type');
  return textColumn(table, 'system').map((system, row) => ({
    system,
    molecule: molecules[row]!,
    reducedMass: columns.mass[row]!,
    lowerTerm: columns.term[row]!,
    offset: columns.offset[row]!,
    lower: {
      we: columns.lowerWe[row]!,
      wexe: columns.lowerWexe[row]!,
      rotation: columns.lowerB[row]!,
      alpha: columns.lowerAlpha[row]!,
    },
    upper: {
      we: columns.upperWe[row]!,
      wexe: columns.upperWexe[row]!,
      rotation: columns.upperB[row]!,
      alpha: columns.upperAlpha[row]!,
    },
    origin: columns.origin[row]!,
    weight: columns.weight[row]!,
    oscillatorStrength: columns.f[row]!,
    type: types[row] === 'parallel' ? 'parallel' : 'perpendicular',
  }));
}

/** Vibrational states taken into account; higher ones hold less than a few per cent below 5000 K. */
const VIBRATIONS = 7;
/** Bands with a smaller Franck-Condon factor are left out. */
const LEAST_OVERLAP = 0.003;
/** Greatest rotational quantum number: the next ones are hardly populated. Hydrides rotate with large constants. */
const GREATEST_ROTATION = 129;
const GREATEST_HYDRIDE_ROTATION = 44;
const HYDRIDE_ROTATION_ABOVE = 3;
/** Wavenumbers that reach the synthesis, cm^-1. */
const LEAST_WAVENUMBER = 9000;
const GREATEST_WAVENUMBER = 29000;
/** Branches: change of rotation and share of the strength, in the limit of large rotation. */
const PARALLEL_BRANCHES = [
  [-1, 0.5],
  [1, 0.5],
] as const;
const PERPENDICULAR_BRANCHES = [
  [-1, 0.25],
  [0, 0.5],
  [1, 0.25],
] as const;
/** Half of the rotational levels of C2 do not exist: carbon 12 has no nuclear spin. */
const HOMONUCLEAR: ReadonlySet<string> = new Set(['C2']);
const HOMONUCLEAR_SHARE = 0.5;
/** Radiative width of molecular lines, s^-1: lifetimes of 0.1 microsecond. Collisions are left out. */
const MOLECULAR_RADIATIVE = 1e7;

/** Vibrational energy above v = 0, cm^-1. */
const vibration = (state: StateConstants, v: number): number => state.we * v - state.wexe * v * (v + 1);

/** Rotational energy, cm^-1, with centrifugal distortion 4 B^3 / omega_e^2 (Kratzer's relation). */
function rotation(state: StateConstants, v: number, j: number): number {
  const b = state.rotation - state.alpha * (v + 0.5);
  const distortion = (4 * b ** 3) / state.we ** 2;
  const jj = j * (j + 1);
  return b * jj - distortion * jj * jj;
}

/** All rotational lines of one vibrational band. */
function bandLines(
  system: BandSystem,
  species: Species,
  lowV: number,
  highV: number,
  overlap: number,
): Line[] {
  const lines: Line[] = [];
  const vibrational = vibration(system.upper, highV) - vibration(system.lower, lowV);
  const lowerEnergy = system.lowerTerm + system.offset + vibration(system.lower, lowV);
  const isHydride = system.lower.rotation > HYDRIDE_ROTATION_ABOVE;
  const lastJ = isHydride ? GREATEST_HYDRIDE_ROTATION : GREATEST_ROTATION;
  const branches = system.type === 'parallel' ? PARALLEL_BRANCHES : PERPENDICULAR_BRANCHES;
  const share = HOMONUCLEAR.has(system.molecule) ? HOMONUCLEAR_SHARE : 1;
  for (const [change, branchShare] of branches) {
    for (let j = 1; j <= lastJ; j += 1) {
      const lowerRotation = rotation(system.lower, lowV, j);
      const wavenumber =
        system.origin + vibrational + rotation(system.upper, highV, j + change) - lowerRotation;
      if (wavenumber <= LEAST_WAVENUMBER) {
        continue;
      }
      lines.push({
        species,
        wavelength: 1e8 / wavenumber,
        energyEv: (lowerEnergy + lowerRotation) / WAVENUMBER_PER_EV,
        gf: system.weight * (2 * j + 1) * system.oscillatorStrength * overlap * branchShare * share,
        radiative: MOLECULAR_RADIATIVE,
        vanDerWaals: 0,
        stark: 0,
      });
    }
  }
  return lines;
}

/**
 * Rotational lines of all bands of the systems: energies from the constants, strengths as
 * gf = weight (2J+1) f q(v',v'') w(branch) with Franck-Condon factors q of Morse potentials
 * (e.g. Herzberg 1950). About 300,000 lines for the bundled table; a second of work.
 */
export function generateBandLines(systems: readonly BandSystem[]): Line[] {
  const lines: Line[] = [];
  for (const system of systems) {
    const species: Species = { kind: 'molecule', number: 0, ion: 0, molecule: system.molecule };
    const oscillator = (state: StateConstants) => ({
      we: state.we,
      wexe: state.wexe,
      distance: equilibriumDistance(state.rotation, system.reducedMass),
      reducedMass: system.reducedMass,
    });
    const overlaps = franckCondon(oscillator(system.lower), oscillator(system.upper), VIBRATIONS);
    for (const [lowV, row] of overlaps.entries()) {
      for (const [highV, overlap] of row.entries()) {
        const bandOrigin = system.origin + vibration(system.upper, highV) - vibration(system.lower, lowV);
        if (overlap < LEAST_OVERLAP || bandOrigin < LEAST_WAVENUMBER || bandOrigin > GREATEST_WAVENUMBER) {
          continue;
        }
        lines.push(...bandLines(system, species, lowV, highV, overlap));
      }
    }
  }
  return lines;
}
