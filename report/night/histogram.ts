/** Counts in equal bins. */
export interface Histogram {
  readonly from: number;
  readonly to: number;
  readonly counts: readonly number[];
}

/**
 * Counts values in `bins` equal bins over [from, to]; both ends belong to a bin, values outside to none.
 *
 * @param bins at least 1
 * @throws RangeError when the range is empty or not finite
 */
export function histogram(values: readonly number[], from: number, to: number, bins: number): Histogram {
  if (!(to > from) || !Number.isFinite(to - from)) {
    throw new RangeError(`histogram range must be finite and not empty, got ${from}..${to}`);
  }
  const counts = new Array<number>(bins).fill(0);
  for (const value of values) {
    if (!(value >= from && value <= to)) continue;
    const bin = Math.min(bins - 1, Math.floor(((value - from) / (to - from)) * bins));
    counts[bin] = counts[bin]! + 1;
  }
  return { from, to, counts };
}
