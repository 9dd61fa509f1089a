import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';

/** Step in ln wavelength of stored spectra and of refit components: 0.5e-4 dex, 34.5 km/s. */
export const COMPONENT_STEP = Math.LN10 * 0.5e-4;

/** Step in ln wavelength of search vectors: 1e-4 dex, 69 km/s, the usual pixel of a survey at R = 2000. */
export const SEARCH_STEP = 2 * COMPONENT_STEP;

/** The velocity one step of a grid stands for, km/s. */
export function stepKmS(grid: LogGrid): number {
  return grid.step * LIGHT_SPEED_KM_S;
}

/**
 * A grid of components that reaches from one wavelength to at least another.
 *
 * @param firstAngstrom centre of pixel 0, vacuum ångström, > 0
 * @param lastAngstrom wavelength the last pixel's centre reaches, > firstAngstrom
 * @returns step {@link COMPONENT_STEP}; an even number of pixels, so that pairs make search pixels
 */
export function componentGridOver(firstAngstrom: number, lastAngstrom: number): LogGrid {
  const lnStart = Math.log(firstAngstrom);
  const pixels = Math.ceil((Math.log(lastAngstrom) - lnStart) / COMPONENT_STEP) + 1;
  return { lnStart, step: COMPONENT_STEP, length: pixels + (pixels % 2) };
}

/** The grid of pairs of pixels: twice the step, half the length (an odd last pixel is left out). */
export function pairedGrid(grid: LogGrid): LogGrid {
  return {
    lnStart: grid.lnStart + 0.5 * grid.step,
    step: 2 * grid.step,
    length: Math.floor(grid.length / 2),
  };
}

/** Means of neighbouring pairs of pixels: a spectrum on {@link pairedGrid}. */
export function averagePairs(flux: Float32Array): Float32Array {
  const pairs = new Float32Array(flux.length >> 1);
  for (let i = 0; i < pairs.length; i++) pairs[i] = 0.5 * (flux[2 * i]! + flux[2 * i + 1]!);
  return pairs;
}

/** Centres of all pixels, vacuum ångström. */
export function wavelengthsOf(grid: LogGrid): Float64Array {
  const wavelengths = new Float64Array(grid.length);
  for (let i = 0; i < grid.length; i++) wavelengths[i] = Math.exp(grid.lnStart + i * grid.step);
  return wavelengths;
}

/** Position of a wavelength (ångström) in pixels from the centre of pixel 0; may lie outside the grid. */
export function pixelAt(grid: LogGrid, wavelengthAngstrom: number): number {
  return (Math.log(wavelengthAngstrom) - grid.lnStart) / grid.step;
}

/**
 * Mean of the pixels whose centres lie in a band.
 *
 * @returns NaN when the band holds no pixel
 */
export function meanOver(
  grid: LogGrid,
  flux: ArrayLike<number>,
  fromAngstrom: number,
  toAngstrom: number,
): number {
  const first = Math.max(0, Math.ceil(pixelAt(grid, fromAngstrom)));
  const end = Math.min(grid.length, Math.floor(pixelAt(grid, toAngstrom)) + 1);
  let sum = 0;
  for (let i = first; i < end; i++) sum += flux[i]!;
  return end > first ? sum / (end - first) : NaN;
}
