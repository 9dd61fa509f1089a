/**
 * Weighted Gram matrix G_jk = Σ_i w_i r_j[i] r_k[i].
 *
 * @param rows K arrays of equal length
 * @param weight same length
 * @returns K × K, row after row, symmetric
 */
export function weightedGram(rows: readonly ArrayLike<number>[], weight: ArrayLike<number>): Float64Array {
  const size = rows.length;
  const gram = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) {
      const sum = weightedDot(rows[j]!, rows[k]!, weight);
      gram[j * size + k] = sum;
      gram[k * size + j] = sum;
    }
  }
  return gram;
}

/** Σ_i w_i a_i b_i over arrays of equal length. */
export function weightedDot(a: ArrayLike<number>, b: ArrayLike<number>, weight: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < weight.length; i++) sum += weight[i]! * a[i]! * b[i]!;
  return sum;
}
