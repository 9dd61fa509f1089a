/** Vibrational states of a Morse potential (Morse 1929, Phys. Rev. 34, 57). */
export interface MorseOscillator {
  /** Harmonic constant omega_e, cm^-1. */
  readonly we: number;
  /** Anharmonic constant omega_e x_e, cm^-1. */
  readonly wexe: number;
  /** Equilibrium distance, angstrom. */
  readonly distance: number;
  /** Reduced mass, u. */
  readonly reducedMass: number;
}

/** hbar^2 / 2 in cm^-1 angstrom^2 u. */
export const HALF_HBAR_SQUARED = 16.857629;

/** Equilibrium distance (angstrom) of a rotational constant B_e (cm^-1). */
export const equilibriumDistance = (rotation: number, reducedMass: number): number =>
  Math.sqrt(HALF_HBAR_SQUARED / (reducedMass * rotation));

/**
 * Wave function of vibrational state v on a grid of distances, normalised to unit sum of squares; zeros when
 * the potential does not bind the state. psi = exp(-z/2) z^(s/2) L_v^s(z) with z = k exp(-a (r - r_e)),
 * k = omega_e / omega_e x_e and s = k - 2v - 1; L_v^s by its upward recurrence. Powers are taken as logarithms:
 * z^(s/2) overflows for heavy molecules.
 */
export function morseState(oscillator: MorseOscillator, v: number, distances: Float64Array): Float64Array {
  const psi = new Float64Array(distances.length);
  const k = oscillator.we / oscillator.wexe;
  const s = k - 2 * v - 1;
  if (s <= 0) {
    return psi;
  }
  const a = Math.sqrt((oscillator.wexe * oscillator.reducedMass) / HALF_HBAR_SQUARED);
  /** ln of the greatest value of exp(-z/2) z^(s/2), at z = s. */
  const lnPeak = 0.5 * s * (Math.log(s) - 1);
  let squares = 0;
  for (let i = 0; i < psi.length; i += 1) {
    const z = k * Math.exp(-a * (distances[i]! - oscillator.distance));
    let previous = 0;
    let laguerre = 1;
    for (let n = 0; n < v; n += 1) {
      const next = ((2 * n + 1 + s - z) * laguerre - (n + s) * previous) / (n + 1);
      previous = laguerre;
      laguerre = next;
    }
    const value = Math.exp(0.5 * (s * Math.log(z) - z) - lnPeak) * laguerre;
    psi[i] = value;
    squares += value * value;
  }
  const norm = 1 / Math.sqrt(squares);
  return psi.map((value) => value * norm);
}

const GRID_POINTS = 1200;
const INSIDE_ANGSTROM = 0.5;
const OUTSIDE_ANGSTROM = 1.2;

/**
 * Franck-Condon factors: squared overlaps [lower v][upper v] of the first `count` states of two oscillators.
 */
export function franckCondon(lower: MorseOscillator, upper: MorseOscillator, count: number): number[][] {
  const first = Math.max(Math.min(lower.distance, upper.distance) - INSIDE_ANGSTROM, 0.05);
  const last = Math.max(lower.distance, upper.distance) + OUTSIDE_ANGSTROM;
  const distances = Float64Array.from(
    { length: GRID_POINTS },
    (_, i) => first + ((last - first) * i) / (GRID_POINTS - 1),
  );
  const states = (oscillator: MorseOscillator): Float64Array[] =>
    Array.from({ length: count }, (_, v) => morseState(oscillator, v, distances));
  const uppers = states(upper);
  return states(lower).map((low) =>
    uppers.map((high) => low.reduce((sum, value, i) => sum + value * high[i]!, 0) ** 2),
  );
}
