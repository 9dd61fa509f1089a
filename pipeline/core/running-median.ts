/**
 * Median of the usable values in a window that slides along an array; the window is cut at the ends.
 *
 * The window is kept sorted: each step removes one value and inserts one by binary search, O(log window)
 * compares and one short block move.
 *
 * @param values any length; only entries with usable[i] != 0 and a finite value count
 * @param window full width in samples, odd, >= 1
 * @param usable same length; default: all
 * @returns NaN where the window holds no usable value
 */
export function runningMedian(
  values: ArrayLike<number>,
  window: number,
  usable?: ArrayLike<number>,
): Float64Array {
  if (!Number.isInteger(window) || window < 1 || window % 2 === 0) {
    throw new RangeError(`runningMedian() window must be an odd whole number, got ${window}`);
  }
  const n = values.length;
  const half = (window - 1) / 2;
  const sorted = new Float64Array(window + 1);
  const out = new Float64Array(n);
  let count = 0;
  const counts = (i: number): boolean =>
    (usable === undefined || usable[i] !== 0) && Number.isFinite(values[i]);
  const insert = (value: number): void => {
    const at = lowerBound(sorted, count, value);
    sorted.copyWithin(at + 1, at, count);
    sorted[at] = value;
    count++;
  };
  for (let i = 0; i < Math.min(half, n); i++) if (counts(i)) insert(values[i]!);
  for (let i = 0; i < n; i++) {
    if (i + half < n && counts(i + half)) insert(values[i + half]!);
    const gone = i - half - 1;
    if (gone >= 0 && counts(gone)) {
      const at = lowerBound(sorted, count, values[gone]!);
      sorted.copyWithin(at, at + 1, count);
      count--;
    }
    const middle = count >> 1;
    if (count === 0) out[i] = NaN;
    else out[i] = count % 2 === 1 ? sorted[middle]! : 0.5 * (sorted[middle - 1]! + sorted[middle]!);
  }
  return out;
}

/** First place among sorted[0..count-1] whose value is >= value. */
function lowerBound(sorted: Float64Array, count: number, value: number): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle]! < value) low = middle + 1;
    else high = middle;
  }
  return low;
}
