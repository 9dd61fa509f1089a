/** sigma of a normal distribution over its median absolute deviation: 1 / Φ⁻¹(3/4). */
const SIGMA_PER_MAD = 1.482602218505602;

/**
 * Quantile of the finite values, linear between order statistics (Hyndman & Fan 1996, definition 7).
 *
 * @param fraction 0 .. 1
 * @returns NaN when no value is finite; cost O(n)
 */
export function quantile(values: ArrayLike<number>, fraction: number): number {
  const finite = finiteOf(values);
  return quantileInPlace(finite, fraction);
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
  const finite = finiteOf(values);
  const centre = quantileInPlace(finite, 0.5);
  for (let i = 0; i < finite.length; i++) finite[i] = Math.abs(finite[i]! - centre);
  return SIGMA_PER_MAD * quantileInPlace(finite, 0.5);
}

function finiteOf(values: ArrayLike<number>): Float64Array {
  const finite = new Float64Array(values.length);
  let count = 0;
  for (let i = 0; i < values.length; i++) if (Number.isFinite(values[i])) finite[count++] = values[i]!;
  return finite.subarray(0, count);
}

/** Reorders `values`. */
function quantileInPlace(values: Float64Array, fraction: number): number {
  if (values.length === 0) return NaN;
  const place = fraction * (values.length - 1);
  const low = Math.floor(place);
  select(values, low);
  let next = Infinity;
  for (let i = low + 1; i < values.length; i++) if (values[i]! < next) next = values[i]!;
  return place === low ? values[low]! : values[low]! + (place - low) * (next - values[low]!);
}

/** Hoare's selection (1961): afterwards values[k] is the k-th smallest, smaller ones before, larger behind. */
function select(values: Float64Array, k: number): void {
  let left = 0;
  let right = values.length - 1;
  while (left < right) {
    const pivot = values[(left + right) >> 1]!;
    let i = left;
    let j = right;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i > j) break;
      const swap = values[i]!;
      values[i] = values[j]!;
      values[j] = swap;
      i++;
      j--;
    }
    if (k <= j) right = j;
    else if (k >= i) left = i;
    else return;
  }
}
