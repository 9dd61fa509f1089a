import { runningMedian } from '../core/running-median.ts';

/**
 * Smooth flux level of each pixel: running median of the usable pixels; places without any take the nearest
 * level; 0 when nothing is usable.
 *
 * @param window full width in pixels, odd
 */
export function smoothLevel(flux: Float64Array, weight: ArrayLike<number>, window: number): Float64Array {
  const level = runningMedian(flux, window, weight);
  let last = level.find((v) => Number.isFinite(v)) ?? 0;
  for (let i = 0; i < level.length; i++) {
    if (Number.isFinite(level[i])) last = level[i]!;
    else level[i] = last;
  }
  return level;
}
