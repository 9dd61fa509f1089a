/**
 * Autocorrelation of a series with gaps at lags 1 .. maxLag: mean product of the pairs in which both samples
 * are usable over the mean square of the usable samples.
 *
 * @param values zero-mean series; unusable samples may be NaN
 * @param usable same length; 0 = gap
 * @param maxLag >= 1
 * @returns length maxLag (entry 0 is lag 1); NaN at lags without a usable pair or when all samples are 0
 */
export function maskedAutocorrelation(
  values: ArrayLike<number>,
  usable: ArrayLike<number>,
  maxLag: number,
): Float64Array {
  const meanProduct = (lag: number): number => {
    let sum = 0;
    let pairs = 0;
    for (let i = 0; i + lag < values.length; i++) {
      if (usable[i] === 0 || usable[i + lag] === 0) continue;
      sum += values[i]! * values[i + lag]!;
      pairs++;
    }
    return sum / pairs;
  };
  const variance = meanProduct(0);
  return Float64Array.from({ length: maxLag }, (_, k) => meanProduct(k + 1) / variance);
}
