/** Half width of the kernel in sigmas: the weight left out is below 1e-4. */
const REACH = 4;

/**
 * Gaussian smoothing that ignores samples without weight: Σ w g x / Σ w g.
 *
 * @param values any length; values with weight 0 may be NaN
 * @param sigma of the kernel in samples, > 0
 * @param weight same length, >= 0; default: all 1
 * @returns NaN where no sample with weight is within reach; cost O(n × sigma)
 */
export function gaussianSmooth(
  values: ArrayLike<number>,
  sigma: number,
  weight?: ArrayLike<number>,
): Float64Array {
  if (!(sigma > 0)) throw new RangeError(`gaussianSmooth() sigma must be > 0, got ${sigma}`);
  const n = values.length;
  const reach = Math.ceil(REACH * sigma);
  const kernel = Float64Array.from({ length: reach + 1 }, (_, k) => Math.exp(-0.5 * (k / sigma) ** 2));
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = 0;
    let norm = 0;
    for (let j = Math.max(0, i - reach); j <= Math.min(n - 1, i + reach); j++) {
      const w = kernel[Math.abs(j - i)]! * (weight === undefined ? 1 : weight[j]!);
      if (w === 0) continue;
      sum += w * values[j]!;
      norm += w;
    }
    out[i] = norm > 0 ? sum / norm : NaN;
  }
  return out;
}

/**
 * Weighted moving mean over a window cut at the ends, by running sums: O(n) whatever the width.
 *
 * @param width full width in samples, odd, >= 1
 * @param weight same length, >= 0
 * @returns 0 where the window holds no weight
 */
export function boxSmooth(values: Float64Array, width: number, weight: Float64Array): Float64Array {
  const n = values.length;
  const half = (width - 1) / 2;
  const out = new Float64Array(n);
  let sum = 0;
  let norm = 0;
  for (let i = -half; i < n; i++) {
    const enters = i + half;
    if (enters < n && weight[enters]! > 0) {
      sum += weight[enters]! * values[enters]!;
      norm += weight[enters]!;
    }
    const leaves = i - half - 1;
    if (leaves >= 0 && weight[leaves]! > 0) {
      sum -= weight[leaves]! * values[leaves]!;
      norm -= weight[leaves]!;
    }
    if (i >= 0) out[i] = norm > 1e-12 ? sum / norm : 0;
  }
  return out;
}
