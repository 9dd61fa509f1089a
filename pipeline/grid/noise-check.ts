import { maskedAutocorrelation } from '../core/autocorrelation.ts';
import { robustSigma } from '../core/quantile.ts';
import { runningMedian } from '../core/running-median.ts';

/** Lags at which the noise correlation is kept. */
export const NOISE_LAGS = 6;
/** Pixels brighter than this many sigmas show the object's own lines, not only noise. */
const FAINT_SIGNAL_TO_NOISE = 5;
/** Below this many pixels the factor would be uncertain by more than 4 per cent. */
const FEWEST_PIXELS = 300;
/** Width of the running median that takes the object out; wide against the lags. */
const HIGH_PASS_PIXELS = 51;
/** Residuals beyond this are spikes, sky-line cores or emission lines. */
const CLIP_SIGMAS = 4;

/** Scatter of one arm against its stated errors. */
export interface NoiseCheck {
  /** Scatter seen / stated, from pairs of pixels 2 to 6 apart. */
  readonly factor: number;
  /** Correlation at lags 1..6. */
  readonly correlation: readonly number[];
  readonly pixels: number;
}

/**
 * Compares the pixel scatter of an arm with its stated errors where the object is faint.
 *
 * Neighbouring pixels are left out of the factor: resampling correlates them, their difference is too small
 * (0.78-0.85 of the stated error on real co-adds where pixels 2 to 6 apart show 0.89-1.04), and errors scaled
 * down to it would make chi-square 1.5 times too large.
 *
 * @param flux,inverseVariance one arm; 0 = unusable
 * @returns null when fewer than 300 faint pixels are usable
 */
export function checkNoise(flux: Float64Array, inverseVariance: Float64Array): NoiseCheck | null {
  const n = flux.length;
  const smooth = runningMedian(flux, HIGH_PASS_PIXELS, inverseVariance);
  const residual = new Float64Array(n);
  const usable = new Uint8Array(n);
  let pixels = 0;
  for (let i = 0; i < n; i++) {
    const root = Math.sqrt(inverseVariance[i]!);
    if (!(root > 0) || !(Math.abs(smooth[i]! * root) < FAINT_SIGNAL_TO_NOISE)) continue;
    residual[i] = (flux[i]! - smooth[i]!) * root;
    usable[i] = 1;
    pixels++;
  }
  if (pixels < FEWEST_PIXELS) return null;
  let sum = 0;
  for (let lag = 2; lag <= NOISE_LAGS; lag++) sum += pairScatter(residual, usable, lag);
  const factor = sum / (NOISE_LAGS - 1);
  for (let i = 0; i < n; i++) if (Math.abs(residual[i]!) > CLIP_SIGMAS * factor) usable[i] = 0;
  const correlation = [...maskedAutocorrelation(residual, usable, NOISE_LAGS)];
  return correlation.every(Number.isFinite) && factor > 0 ? { factor, correlation, pixels } : null;
}

/** Robust scatter of one pixel from differences of pixels `lag` apart; NaN without pairs. */
function pairScatter(residual: Float64Array, usable: Uint8Array, lag: number): number {
  const differences: number[] = [];
  for (let i = 0; i + lag < residual.length; i++) {
    if (usable[i] === 1 && usable[i + lag] === 1) differences.push(residual[i + lag]! - residual[i]!);
  }
  return robustSigma(differences) / Math.SQRT2;
}

/** Joins the checks of several arms, each in proportion to its pixels; null when there are none. */
export function joinNoiseChecks(checks: readonly (NoiseCheck | null)[]): NoiseCheck | null {
  const known = checks.filter((check) => check !== null);
  const pixels = known.reduce((sum, check) => sum + check.pixels, 0);
  if (pixels === 0) return null;
  const mean = (of: (check: NoiseCheck) => number): number =>
    known.reduce((sum, check) => sum + check.pixels * of(check), 0) / pixels;
  return {
    factor: Math.sqrt(mean((check) => check.factor ** 2)),
    correlation: Array.from({ length: NOISE_LAGS }, (_, k) => mean((check) => check.correlation[k]!)),
    pixels,
  };
}
