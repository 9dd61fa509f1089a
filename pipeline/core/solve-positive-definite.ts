/**
 * Cholesky solve of a small symmetric positive definite system. Unlike `solveSymmetric` it never gives up: a pivot
 * lost to rounding is lifted to 1e-12 of its diagonal, so that near-copies share an amplitude instead of failing.
 *
 * @param matrix full or lower triangle, row after row
 */
export function solvePositiveDefinite(
  matrix: readonly (readonly number[])[],
  right: readonly number[],
): number[] {
  const m = right.length;
  const lower: number[][] = [];
  for (let i = 0; i < m; i++) {
    const row: number[] = [];
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i]![j]!;
      for (let k = 0; k < j; k++) sum -= (i === j ? row[k]! : lower[j]![k]!) * row[k]!;
      if (i === j) row.push(Math.sqrt(Math.max(sum, 1e-12 * matrix[i]![i]!)));
      else row.push(sum / lower[j]![j]!);
    }
    lower.push(row);
  }
  const x = [...right];
  for (let i = 0; i < m; i++) {
    for (let k = 0; k < i; k++) x[i]! -= lower[i]![k]! * x[k]!;
    x[i]! /= lower[i]![i]!;
  }
  for (let i = m - 1; i >= 0; i--) {
    for (let k = i + 1; k < m; k++) x[i]! -= lower[k]![i]! * x[k]!;
    x[i]! /= lower[i]![i]!;
  }
  return x;
}
