import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';

/** Step of the stored spectra in log10(wavelength): 34.5 km/s, half the pixel of a survey spectrograph. */
export const STORED_LOG10_STEP = 0.5e-4;
/** First pixel, vacuum angstrom. */
export const STORED_START_ANGSTROM = 1460;
const STORED_END_ANGSTROM = 10600;

/** Grid of the stored star spectra: uniform in the logarithm of vacuum wavelength. */
export const STORED_GRID: LogGrid = {
  lnStart: Math.log(STORED_START_ANGSTROM),
  step: STORED_LOG10_STEP * Math.LN10,
  length: Math.trunc(Math.log10(STORED_END_ANGSTROM / STORED_START_ANGSTROM) / STORED_LOG10_STEP),
};

/** Gaussian applied before storing, so that a pixel holds no more detail than it can, sigma in km/s. */
export const STORED_SIGMA_KM_S = 25;
const KERNEL_REACH_SIGMAS = 4;

/** Convolves with a Gaussian whose sigma is given in pixels; the ends repeat their last value. */
function smooth(flux: Float64Array, sigma: number): Float64Array {
  const reach = Math.ceil(KERNEL_REACH_SIGMAS * sigma);
  const kernel = Float64Array.from({ length: 2 * reach + 1 }, (_, i) =>
    Math.exp(-0.5 * ((i - reach) / sigma) ** 2),
  );
  const total = kernel.reduce((sum, value) => sum + value, 0);
  const padded = new Float64Array(flux.length + 2 * reach);
  padded.fill(flux[0]!, 0, reach);
  padded.set(flux, reach);
  padded.fill(flux[flux.length - 1]!, reach + flux.length);
  const out = new Float64Array(flux.length);
  for (let i = 0; i < out.length; i += 1) {
    let sum = 0;
    for (let k = 0; k < kernel.length; k += 1) {
      sum += kernel[k]! * padded[i + k]!;
    }
    out[i] = sum / total;
  }
  return out;
}

/**
 * Brings a synthetic spectrum to the stored grid: Gaussian of STORED_SIGMA_KM_S, then the mean over each
 * stored pixel (through the running integral, so that flux is conserved).
 * @param grid must cover STORED_GRID with finer pixels.
 */
export function toStoredGrid(flux: Float64Array, grid: LogGrid): Float32Array {
  const smoothed = smooth(flux, STORED_SIGMA_KM_S / LIGHT_SPEED_KM_S / grid.step);
  const integral = new Float64Array(flux.length + 1);
  for (let i = 0; i < flux.length; i += 1) {
    integral[i + 1] = integral[i]! + smoothed[i]!;
  }
  /** Running integral at a position where pixel i covers i - 0.5 .. i + 0.5. */
  const integralAt = (position: number): number => {
    const edge = Math.min(Math.max(position + 0.5, 0), flux.length);
    const i = Math.min(Math.floor(edge), flux.length - 1);
    return integral[i]! + (edge - i) * smoothed[i]!;
  };
  const perStored = STORED_GRID.step / grid.step;
  const offset = (STORED_GRID.lnStart - grid.lnStart) / grid.step;
  return Float32Array.from({ length: STORED_GRID.length }, (_, i) => {
    const left = offset + (i - 0.5) * perStored;
    return (integralAt(left + perStored) - integralAt(left)) / perStored;
  });
}
