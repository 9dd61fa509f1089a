import { SPEED_OF_LIGHT_KM_S } from './light.ts';
import type { ArmLayout } from './layout.ts';

/** FWHM of a Gaussian over its sigma: 2 sqrt(2 ln 2). */
export const FWHM_PER_SIGMA = 2 * Math.sqrt(2 * Math.LN2);

/**
 * Gaussian sigma of the line spread in km/s from an array as the input gives it.
 *
 * @param values same length as the wavelengths (n), or rows × n for a resolution matrix
 * @param meaning what the values are
 * @param wavelengthAngstrom pixel centres, monotonic, n >= 2
 * @returns length n; NaN where the input says nothing usable
 */
export function lineSpreadSigmaKmS(
  values: Float64Array,
  meaning: ArmLayout['lineSpreadMeaning'],
  wavelengthAngstrom: Float64Array,
): Float64Array {
  const n = wavelengthAngstrom.length;
  const kmSPerAngstrom = (i: number): number => SPEED_OF_LIGHT_KM_S / wavelengthAngstrom[i]!;
  const own = meaning === 'resolution-matrix' ? sigmaOfBands(values, n) : values;
  return Float64Array.from({ length: n }, (_, i) => {
    const value = own[i]!;
    if (!(value > 0)) return NaN;
    switch (meaning) {
      case 'sigma-km-s':
        return value;
      case 'resolving-power':
        return SPEED_OF_LIGHT_KM_S / (value * FWHM_PER_SIGMA);
      case 'sigma-angstrom':
        return value * kmSPerAngstrom(i);
      case 'fwhm-angstrom':
        return (value / FWHM_PER_SIGMA) * kmSPerAngstrom(i);
      case 'fwhm-pixel':
        return (value / FWHM_PER_SIGMA) * pixelWidth(wavelengthAngstrom, i) * kmSPerAngstrom(i);
      case 'sigma-pixel':
      case 'resolution-matrix':
        return value * pixelWidth(wavelengthAngstrom, i) * kmSPerAngstrom(i);
    }
  });
}

/** Width of a pixel, ångström: half the distance of its neighbours. */
function pixelWidth(wavelengthAngstrom: Float64Array, i: number): number {
  const low = Math.max(0, i - 1);
  const high = Math.min(wavelengthAngstrom.length - 1, i + 1);
  return Math.abs(wavelengthAngstrom[high]! - wavelengthAngstrom[low]!) / (high - low);
}

/**
 * Second moment of each column of a banded matrix, rows being offsets one pixel apart, in pixels. The order of the
 * offsets does not matter to it.
 *
 * A band of eleven offsets is dominated by noise in its far wings once weighted by the square of the distance, so
 * the moment is taken from the peak out to the first value that is not positive.
 */
function sigmaOfBands(bands: Float64Array, n: number): Float64Array {
  const offsets = bands.length / n;
  return Float64Array.from({ length: n }, (_, i) => {
    const at = (k: number): number => bands[k * n + i] ?? 0;
    let peak = 0;
    for (let k = 1; k < offsets; k += 1) if (at(k) > at(peak)) peak = k;
    let first = peak;
    while (first > 0 && at(first - 1) > 0) first -= 1;
    let last = peak;
    while (last < offsets - 1 && at(last + 1) > 0) last += 1;
    let weight = 0;
    let mean = 0;
    for (let k = first; k <= last; k += 1) {
      weight += at(k);
      mean += at(k) * k;
    }
    mean /= weight;
    let moment = 0;
    for (let k = first; k <= last; k += 1) moment += at(k) * (k - mean) ** 2;
    return weight > 0 ? Math.sqrt(moment / weight) : NaN;
  });
}
