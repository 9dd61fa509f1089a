import { median, robustSigma } from '../core/quantile.ts';
import { runningMedian } from '../core/running-median.ts';

/** Pixels of the running median that is taken off first: wide against a line, narrow against the continuum. */
const CONTINUUM_WINDOW = 51;
/** Pixels over which one noise level is measured: night-sky bands are 100-300 pixels wide at R 500-2,000. */
const NOISE_WINDOW = 101;
/** How far one window's level lies from the next. */
const NOISE_STRIDE = 20;
/**
 * Neighbouring pixels of resampled spectra correlate at 0.25-0.28 (measured on real co-adds), so their
 * difference is 0.8 of the noise; at lags 2-4 the correlation is gone.
 */
const LAGS = [2, 3, 4];
/** No real detector is ten times quieter in one place than it is on the whole. */
const LOWEST_OF_MEDIAN = 0.1;
/** Fewer pixels than this in a window say nothing about its noise. */
const FEWEST_PIXELS = 12;

/**
 * Inverse variance of a spectrum that states none, from its own scatter: the robust spread of differences at
 * lags 2-4 of what a running median leaves, over √2, in windows of about 100 pixels; never below a tenth of
 * the spectrum's median level, so that flat padding does not look exact.
 *
 * Lines narrower than the window count as noise; that makes the estimate cautious by a few per cent.
 *
 * @param flux any unit
 * @param usable same length, 0 = leave out
 * @returns same length, 1/flux²; 0 where not usable or where the noise cannot be told
 */
export function estimateInverseVariance(flux: Float64Array, usable: Uint8Array): Float64Array {
  const n = flux.length;
  const inverseVariance = new Float64Array(n);
  const continuum = runningMedian(flux, CONTINUUM_WINDOW, usable);
  const highPass = flux.map((value, i) => (usable[i] === 0 ? NaN : value - continuum[i]!));
  const centres: number[] = [];
  const sigmas: number[] = [];
  for (let centre = 0; centre < n + NOISE_STRIDE; centre += NOISE_STRIDE) {
    const first = Math.max(0, Math.min(centre, n - 1) - (NOISE_WINDOW - 1) / 2);
    const sigma = scatterAtLags(highPass.subarray(first, first + NOISE_WINDOW));
    if (!(sigma > 0)) continue;
    centres.push(Math.min(centre, n - 1));
    sigmas.push(sigma);
  }
  if (sigmas.length === 0) return inverseVariance;
  const floor = LOWEST_OF_MEDIAN * median(sigmas);
  for (let i = 0; i < n; i += 1) {
    if (usable[i] === 0) continue;
    inverseVariance[i] = 1 / Math.max(interpolate(centres, sigmas, i), floor) ** 2;
  }
  return inverseVariance;
}

/** Robust sigma of one window from differences at the lags; NaN when too few pairs are finite. */
function scatterAtLags(highPass: Float64Array): number {
  const estimates: number[] = [];
  for (const lag of LAGS) {
    const differences = highPass.subarray(lag).map((value, i) => (value - highPass[i]!) / Math.SQRT2);
    if (differences.filter(Number.isFinite).length >= FEWEST_PIXELS) estimates.push(robustSigma(differences));
  }
  return median(estimates);
}

/** Linear between knots, constant beyond them. */
function interpolate(knots: readonly number[], values: readonly number[], at: number): number {
  let above = knots.findIndex((knot) => knot >= at);
  if (above === 0) return values[0]!;
  if (above < 0) above = knots.length - 1;
  const low = knots[above - 1] ?? knots[above]!;
  const high = knots[above]!;
  const fraction = high > low ? Math.min(1, (at - low) / (high - low)) : 1;
  const before = values[above - 1] ?? values[above]!;
  return before + fraction * (values[above]! - before);
}
