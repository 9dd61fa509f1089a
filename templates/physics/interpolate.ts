/**
 * Linear interpolation in a table with ascending abscissae, constant beyond its ends.
 * @param xs ascending, at least one value; ys as long as xs.
 */
export function interpolateClamped(xs: Float64Array, ys: Float64Array, x: number): number {
  const last = xs.length - 1;
  if (x <= xs[0]!) {
    return ys[0]!;
  }
  if (x >= xs[last]!) {
    return ys[last]!;
  }
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (xs[middle]! <= x) {
      low = middle;
    } else {
      high = middle;
    }
  }
  const part = (x - xs[low]!) / (xs[high]! - xs[low]!);
  return ys[low]! + part * (ys[high]! - ys[low]!);
}
