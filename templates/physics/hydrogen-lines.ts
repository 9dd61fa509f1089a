import { FINE_STRUCTURE, RYDBERG_HYDROGEN } from './constants.ts';

/** A line of hydrogen between levels lower < upper. */
export interface HydrogenLine {
  readonly lower: number;
  readonly upper: number;
  /** Vacuum, angstrom. */
  readonly wavelength: number;
  /** Absorption oscillator strength. */
  readonly oscillatorStrength: number;
}

/** Relativistic lowering of level n in units of the Rydberg energy, averaged over its fine structure. */
const fineStructureShift = (n: number): number => (FINE_STRUCTURE ** 2 * (1.25 - 1 / n)) / n ** 4;

/**
 * Vacuum wavelength (angstrom) of the transition lower-upper: Rydberg's formula with the mean fine-structure
 * shift of both levels (Sommerfeld 1916, averaged with statistical weights). Within 0.3 km/s (Lyman alpha 0.8) of the
 * strength-weighted centroid; Rydberg's formula alone is 2-4 km/s too red.
 */
export function hydrogenWavelength(lower: number, upper: number): number {
  const energy = 1 / lower ** 2 - 1 / upper ** 2 + fineStructureShift(lower) - fineStructureShift(upper);
  return 1e8 / (RYDBERG_HYDROGEN * energy);
}

/** Gauss's hypergeometric polynomial F(-n, b; 1; x), n a non-negative integer. */
function hypergeometric(n: number, b: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let k = 0; k < n; k += 1) {
    term *= ((k - n) * (b + k) * x) / (k + 1) ** 2;
    sum += term;
  }
  return sum;
}

/**
 * Absorption oscillator strength between levels, averaged over the sub-levels (Menzel & Pekeris 1935, MNRAS
 * 96, 77, eq. 1.29): Kramers' value times an exact Gaunt factor.
 */
export function hydrogenOscillatorStrength(lower: number, upper: number): number {
  const kramers =
    32 / (3 * Math.PI * Math.sqrt(3)) / (lower ** 5 * upper ** 3 * (1 / lower ** 2 - 1 / upper ** 2) ** 3);
  const difference = upper - lower;
  const x = (-4 * lower * upper) / difference ** 2;
  const delta = hypergeometric(lower - 1, -upper, x) ** 2 - hypergeometric(lower, 1 - upper, x) ** 2;
  const gaunt =
    Math.PI *
    Math.sqrt(3) *
    Math.abs(
      (difference / (upper + lower)) ** (2 * (upper + lower)) * ((upper * lower) / difference) * delta,
    );
  return kramers * gaunt;
}

/** Last levels: beyond them lines merge into the series limit in any star. Of Lyman only alpha reaches 1450 A. */
const LAST_UPPER: readonly (readonly [number, number])[] = [
  [1, 2],
  [2, 30],
  [3, 27],
];

/** The lines whose wings reach 1450-10,700 angstrom: Lyman alpha, Balmer to n = 30, Paschen to n = 27. */
export const HYDROGEN_LINES: readonly HydrogenLine[] = LAST_UPPER.flatMap(([lower, last]) =>
  Array.from({ length: last - lower }, (_, i) => ({
    lower,
    upper: lower + 1 + i,
    wavelength: hydrogenWavelength(lower, lower + 1 + i),
    oscillatorStrength: hydrogenOscillatorStrength(lower, lower + 1 + i),
  })),
);
