import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';

/** The velocity one step of a grid stands for, km/s. */
export function stepKmS(grid: LogGrid): number {
  return grid.step * LIGHT_SPEED_KM_S;
}

/**
 * A grid whose pixels fall on those of another, over a different range.
 *
 * @param other the grid to line up with
 * @param shortest ångström the first pixel's centre must not exceed
 * @param longest ångström the last pixel's centre reaches
 * @returns same step; starts an even number of pixels away and is even in length, so that pairs line up too
 */
export function gridThrough(other: LogGrid, shortest: number, longest: number): LogGrid {
  const offset = 2 * Math.floor(pixelAt(other, shortest) / 2);
  const length = Math.ceil(pixelAt(other, longest)) - offset + 1;
  return {
    lnStart: other.lnStart + offset * other.step,
    step: other.step,
    length: length + (length % 2),
  };
}

/**
 * A spectrum laid into another grid of the same step and phase (see {@link gridThrough}); zero where it ends.
 */
export function laidInto(target: LogGrid, grid: LogGrid, flux: Float32Array): Float32Array {
  const offset = Math.round((grid.lnStart - target.lnStart) / target.step);
  const laid = new Float32Array(target.length);
  for (let i = Math.max(0, offset); i < Math.min(target.length, offset + flux.length); i++) {
    laid[i] = flux[i - offset]!;
  }
  return laid;
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
