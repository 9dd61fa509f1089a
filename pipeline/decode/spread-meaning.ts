import { median } from '../core/quantile.ts';
import { estimateInverseVariance } from './estimate-noise.ts';
import type { SpreadMeaning } from './layout.ts';

/** Stated errors are right within this factor on every real spectrum seen; beyond it an array is something else. */
const LARGEST_FACTOR = 5;

/** How well an array explains the scatter of a flux. */
export interface SpreadReading {
  readonly meaning: SpreadMeaning;
  /** Absolute log10 of (what the array says / what the scatter says) for the best reading, in sigma. */
  readonly mismatch: number;
}

/**
 * Decide by the numbers whether an array is the error, the variance or the inverse variance of a flux.
 *
 * @param flux any unit
 * @param candidate same length
 * @returns null when no reading comes within a factor 5 of the scatter seen, or the array has negative values
 */
export function spreadMeaningByNumbers(flux: Float64Array, candidate: Float64Array): SpreadReading | null {
  if (candidate.some((value) => value < 0)) return null;
  const usable = Uint8Array.from(flux, (value, i) =>
    Number.isFinite(value) && value !== 0 && candidate[i]! > 0 ? 1 : 0,
  );
  const seen = estimateInverseVariance(flux, usable);
  const logRatio = (sigmaOf: (value: number) => number): number =>
    median(
      seen.map((weight, i) => (weight > 0 ? Math.log10(sigmaOf(candidate[i]!) * Math.sqrt(weight)) : NaN)),
    );
  const readings: SpreadReading[] = [
    { meaning: 'error', mismatch: Math.abs(logRatio((value) => value)) },
    { meaning: 'variance', mismatch: Math.abs(logRatio(Math.sqrt)) },
    { meaning: 'inverse-variance', mismatch: Math.abs(logRatio((value) => 1 / Math.sqrt(value))) },
  ];
  const best = readings.reduce((a, b) => (b.mismatch < a.mismatch ? b : a));
  return best.mismatch < Math.log10(LARGEST_FACTOR) ? best : null;
}
