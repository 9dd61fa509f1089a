/**
 * Below this width (pixels) a sampled Gaussian no longer has the variance it should: at 0.7 its variance is
 * right within 0.1 per cent, at 0.4 it is a tenth short.
 */
const NARROWEST_SAMPLED_SIGMA = 0.7;

/** A Gaussian is cut where it has fallen to exp(-8) = 3e-4 of its peak. */
const REACH_IN_SIGMA = 4;

/**
 * One half of a symmetric smoothing kernel: weight at distance 0, 1, 2 … pixels; the whole sums to 1.
 * Very narrow ones have three points and exactly the variance asked for.
 *
 * @param sigmaPixels standard deviation, pixels, ≥ 0
 */
export function gaussianKernel(sigmaPixels: number): Float64Array {
  if (!(sigmaPixels >= 0)) throw new RangeError(`sigmaPixels must be ≥ 0, got ${sigmaPixels}`);
  if (sigmaPixels < NARROWEST_SAMPLED_SIGMA) {
    const variance = sigmaPixels * sigmaPixels;
    return Float64Array.of(1 - variance, 0.5 * variance);
  }
  const reach = Math.ceil(REACH_IN_SIGMA * sigmaPixels);
  const kernel = new Float64Array(reach + 1);
  let sum = 0;
  for (let k = 0; k <= reach; k++) {
    kernel[k] = Math.exp(-0.5 * (k / sigmaPixels) ** 2);
    sum += k === 0 ? kernel[k]! : 2 * kernel[k]!;
  }
  return kernel.map((weight) => weight / sum);
}

/**
 * A spectrum convolved with a Gaussian of constant velocity width. Beyond its ends the spectrum is taken to
 * go on at its end value.
 *
 * @param flux on a grid uniform in ln wavelength, at least one pixel
 * @param sigmaPixels standard deviation in pixels of that grid, ≥ 0; 0 copies
 */
export function broaden(flux: Float32Array | Float64Array, sigmaPixels: number): Float32Array {
  const kernel = gaussianKernel(sigmaPixels);
  const length = flux.length;
  const reach = kernel.length - 1;
  const padded = new Float64Array(length + 2 * reach);
  padded.set(flux, reach);
  padded.fill(padded[reach]!, 0, reach);
  padded.fill(padded[reach + length - 1]!, reach + length);
  const smooth = new Float32Array(length);
  for (let i = 0; i < length; i++) {
    const centre = i + reach;
    let sum = kernel[0]! * padded[centre]!;
    for (let k = 1; k <= reach; k++) sum += kernel[k]! * (padded[centre - k]! + padded[centre + k]!);
    smooth[i] = sum;
  }
  return smooth;
}

/**
 * The Gaussian that takes a spectrum from the width it has to the width it should have, km/s:
 * sqrt(target² − present²), 0 when it is that wide already.
 */
export function missingWidthKmS(targetKmS: number, presentKmS: number): number {
  return Math.sqrt(Math.max(0, targetKmS * targetKmS - presentKmS * presentKmS));
}
