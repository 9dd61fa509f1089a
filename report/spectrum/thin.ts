/**
 * Chooses which samples of a curve to keep so that no spike is lost: the samples are split into equal bins and
 * of each bin the lowest and the highest are kept, in their own order. Every kept sample is a real one.
 *
 * @param values the curve; NaN never wins against a number
 * @param limit at least 2: how many samples may stay
 * @param preferred 1 = choose among these first; a bin without any chooses among all
 * @returns ascending indexes, at most `limit`; all indexes when the curve is short enough
 */
export function thinIndexes(
  values: ArrayLike<number>,
  limit: number,
  preferred?: ArrayLike<number>,
): Uint32Array {
  const n = values.length;
  if (limit < 2) throw new RangeError(`limit must be at least 2, got ${limit}`);
  if (n <= limit) return Uint32Array.from({ length: n }, (_, i) => i);
  const bins = Math.floor(limit / 2);
  const kept: number[] = [];
  for (let bin = 0; bin < bins; bin++) {
    const first = Math.floor((bin * n) / bins);
    const end = Math.floor(((bin + 1) * n) / bins);
    const extremes = extremesOf(values, first, end, preferred) ?? extremesOf(values, first, end);
    const [low, high] = extremes ?? [first, first];
    kept.push(Math.min(low, high));
    if (low !== high) kept.push(Math.max(low, high));
  }
  return Uint32Array.from(kept);
}

function extremesOf(
  values: ArrayLike<number>,
  first: number,
  end: number,
  preferred?: ArrayLike<number>,
): [number, number] | null {
  let low = -1;
  let high = -1;
  for (let i = first; i < end; i++) {
    if (Number.isNaN(values[i]!) || (preferred !== undefined && preferred[i] === 0)) continue;
    if (low === -1 || values[i]! < values[low]!) low = i;
    if (high === -1 || values[i]! > values[high]!) high = i;
  }
  return low === -1 ? null : [low, high];
}
