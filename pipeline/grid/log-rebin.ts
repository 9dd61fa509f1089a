import { edgesFromCentres, forEachOverlap } from '../core/rebin.ts';

/** A new pixel counts when at least this part of it is covered by used pixels. */
const LEAST_COVERED = 0.5;

/** One arm on the common axis, before scaling. */
export interface RebinnedArm {
  /** Pixel of the common axis, in steps from ln(wavelength) = 0, at which `flux` starts. */
  readonly firstStep: number;
  readonly flux: Float64Array;
  readonly weight: Float64Array;
}

/**
 * Rebins one arm to pixels of equal size in ln(wavelength), conserving flux: a new pixel holds the mean of the
 * flux density over its wavelengths, so the integral over whole pixels is kept.
 *
 * Weights share out information: each native pixel's 1/sigma² goes to the new pixels in proportion to overlap,
 * so the sum of weights is kept. Propagating variances alone would count the noise that two new pixels share
 * twice (a half-pixel shift halves the variance and hides as much in the covariance).
 *
 * @param wavelengthAngstrom pixel centres, increasing, length n >= 2; edges lie half way
 * @param flux,inverseVariance length n; pixels with inverseVariance 0 give nothing
 * @param step in ln(wavelength)
 */
export function rebinToLog(
  wavelengthAngstrom: Float64Array,
  flux: Float64Array,
  inverseVariance: Float64Array,
  step: number,
): RebinnedArm {
  const from = edgesFromCentres(wavelengthAngstrom);
  const firstStep = Math.ceil(Math.log(from[0]!) / step);
  const lastStep = Math.floor(Math.log(from[from.length - 1]!) / step);
  const length = Math.max(1, lastStep - firstStep + 1);
  const to = Float64Array.from({ length: length + 1 }, (_, j) => Math.exp((firstStep + j - 0.5) * step));
  const out = new Float64Array(length);
  const weight = new Float64Array(length);
  const covered = new Float64Array(length);
  forEachOverlap(from, to, (i, j, overlap) => {
    if (!(inverseVariance[i]! > 0)) return;
    out[j] = out[j]! + flux[i]! * overlap;
    covered[j] = covered[j]! + overlap;
    weight[j] = weight[j]! + (inverseVariance[i]! * overlap) / (from[i + 1]! - from[i]!);
  });
  for (let j = 0; j < length; j++) {
    const enough = covered[j]! >= LEAST_COVERED * (to[j + 1]! - to[j]!);
    out[j] = enough ? out[j]! / covered[j]! : 0;
    if (!enough) weight[j] = 0;
  }
  return { firstStep, flux: out, weight };
}
