/** sigma of a normal distribution over its median absolute deviation: 1 / Φ⁻¹(3/4). */
const SIGMA_PER_MAD = 1.482602218505602;

/**
 * Quantile of the finite values, linear between order statistics (Hyndman & Fan 1996, definition 7).
 *
 * @param fraction 0 .. 1
 * @returns NaN when no value is finite
 */
export function quantile(values: ArrayLike<number>, fraction: number): number {
  const sorted = Float64Array.from(values).filter(Number.isFinite).sort();
  if (sorted.length === 0) return NaN;
  const place = fraction * (sorted.length - 1);
  const low = Math.floor(place);
  const high = Math.min(low + 1, sorted.length - 1);
  return sorted[low]! + (place - low) * (sorted[high]! - sorted[low]!);
}

/** Median of the finite values; NaN when there are none. */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}

/**
 * Standard deviation of the bulk of the finite values, from the median absolute deviation about the median;
 * unbiased for normal noise and blind to outliers. NaN when no value is finite.
 */
export function robustSigma(values: ArrayLike<number>): number {
  const centre = median(values);
  return SIGMA_PER_MAD * median(Float64Array.from(values, (v) => Math.abs(v - centre)));
}
