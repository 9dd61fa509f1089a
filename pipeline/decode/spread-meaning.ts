import { median } from '../core/quantile.ts';
import { estimateInverseVariance } from './estimate-noise.ts';
import type { SpreadMeaning } from './layout.ts';

/** Stated errors are right within this factor on every real spectrum seen; beyond it an array is something else. */
const LARGEST_FACTOR = 5;

/** The scatter of a spectrum tells its size no better than this; closer readings (values near 1) are a tie. */
const TIE_FACTOR = 1.5;
/** Correlation, in logarithms, below which an array falls where the scatter rises. */
const FALLING_CORRELATION = -0.3;

/** How well an array explains the scatter of a flux. */
export interface SpreadReading {
  readonly meaning: SpreadMeaning;
  /** Absolute log10 of (what the array says / what the scatter says) for the best reading, in sigma. */
  readonly mismatch: number;
}

/**
 * Decide by the numbers whether an array is the error, the variance or the inverse variance of a flux.
 *
 * Where the values lie so near 1 that all readings fit, an array that falls where the scatter rises is an inverse
 * variance, and any other an error, which is the commonest.
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
  const nearest = readings.reduce((a, b) => (b.mismatch < a.mismatch ? b : a));
  const [error] = readings;
  const isTie = error!.mismatch - nearest.mismatch < Math.log10(TIE_FACTOR);
  const best = isTie && !fallsWithScatter(candidate, seen) ? error! : nearest;
  return best.mismatch < Math.log10(LARGEST_FACTOR) ? best : null;
}

/** Whether the logarithms of the candidate and of the scatter seen run against each other. */
function fallsWithScatter(candidate: Float64Array, seen: Float64Array): boolean {
  const pairs: [number, number][] = [];
  seen.forEach((weight, i) => {
    if (weight > 0 && candidate[i]! > 0) pairs.push([Math.log(candidate[i]!), -0.5 * Math.log(weight)]);
  });
  const mean = (side: 0 | 1): number => pairs.reduce((sum, pair) => sum + pair[side], 0) / pairs.length;
  const [meanCandidate, meanScatter] = [mean(0), mean(1)];
  let both = 0;
  let ofCandidate = 0;
  let ofScatter = 0;
  for (const [a, b] of pairs) {
    both += (a - meanCandidate) * (b - meanScatter);
    ofCandidate += (a - meanCandidate) ** 2;
    ofScatter += (b - meanScatter) ** 2;
  }
  return both < FALLING_CORRELATION * Math.sqrt(ofCandidate * ofScatter);
}
