import { median, robustSigma } from '../core/quantile.ts';

/** Pixels over which one noise level is measured: night-sky bands are 100-300 pixels wide at R 500-2,000. */
const NOISE_WINDOW = 101;
/** How far one window's centre lies from the next. */
const NOISE_STRIDE = 20;
/**
 * Neighbouring pixels of resampled spectra correlate at 0.25-0.28 (measured on real co-adds), so what they differ by
 * is 0.8 of the noise; two pixels apart the correlation is gone.
 */
const LAG = 2;
/** Standard deviation of x(-lag) - 2 x(0) + x(lag) for independent noise of unit width. */
const SIGMA_OF_SECOND_DIFFERENCE = Math.sqrt(6);
/** No real detector is ten times quieter in one place than it is on the whole. */
const LOWEST_OF_MEDIAN = 0.1;
/** Fewer differences than this in a window say nothing about its noise. */
const FEWEST_DIFFERENCES = 12;

/**
 * Inverse variance of a spectrum that states none, from its own scatter: the robust spread of second differences at
 * lag 2 over √6, in windows of about 100 pixels; never below a tenth of the spectrum's median level, so that flat
 * padding does not look exact.
 *
 * Second differences are blind to any slope, so no continuum is taken off first. Against the stated errors of 158 real
 * spectra the median ratio is 0.9-1.1; features as narrow as the line spread count as noise in part (up to 1.4 for
 * late-type stars above S/N 20, where first differences at lags 2-4 give 1.8).
 *
 * @param flux any unit
 * @param usable same length, 0 = leave out
 * @returns same length, 1/flux²; 0 where not usable or where the noise cannot be told
 */
export function estimateInverseVariance(flux: Float64Array, usable: Uint8Array): Float64Array {
  const n = flux.length;
  const inverseVariance = new Float64Array(n);
  const differences = secondDifferences(flux, usable);
  const centres: number[] = [];
  const sigmas: number[] = [];
  for (let centre = 0; centre < n + NOISE_STRIDE; centre += NOISE_STRIDE) {
    const inside = Math.min(centre, n - 1);
    const first = Math.max(0, inside - (NOISE_WINDOW - 1) / 2);
    const seen = differences.subarray(first, first + NOISE_WINDOW).filter(Number.isFinite);
    if (seen.length < FEWEST_DIFFERENCES) continue;
    const sigma = robustSigma(seen);
    if (!(sigma > 0)) continue;
    centres.push(inside);
    sigmas.push(sigma);
  }
  if (sigmas.length === 0) return inverseVariance;
  const floor = LOWEST_OF_MEDIAN * median(sigmas);
  let above = 0;
  for (let i = 0; i < n; i += 1) {
    while (above < centres.length - 1 && centres[above]! < i) above += 1;
    if (usable[i] === 0) continue;
    const sigma = interpolate(centres, sigmas, above, i);
    inverseVariance[i] = 1 / Math.max(sigma, floor) ** 2;
  }
  return inverseVariance;
}

/** Second differences in units of the noise; NaN where a pixel of the three is not usable. */
function secondDifferences(flux: Float64Array, usable: Uint8Array): Float64Array {
  const n = flux.length;
  const differences = new Float64Array(n).fill(NaN);
  for (let i = LAG; i < n - LAG; i += 1) {
    if (usable[i - LAG] === 0 || usable[i] === 0 || usable[i + LAG] === 0) continue;
    differences[i] = (flux[i - LAG]! - 2 * flux[i]! + flux[i + LAG]!) / SIGMA_OF_SECOND_DIFFERENCE;
  }
  return differences;
}

/** Linear between knots `above - 1` and `above`, constant beyond the ends. */
function interpolate(knots: readonly number[], values: readonly number[], above: number, at: number): number {
  const high = knots[above]!;
  const low = knots[above - 1];
  if (low === undefined || at >= high) return values[above]!;
  const fraction = (at - low) / (high - low);
  return values[above - 1]! + fraction * (values[above]! - values[above - 1]!);
}
