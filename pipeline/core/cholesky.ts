/**
 * Cholesky factor of a symmetric positive definite matrix, in place: A = L Lᵀ (Golub & Van Loan 2013, 4.2).
 *
 * @param a n × n, row after row; only the lower triangle is read, and it receives L
 * @returns false when a pivot is not positive (the matrix is not positive definite); `a` is then half done
 */
export function choleskyInPlace(a: Float64Array, n: number): boolean {
  for (let j = 0; j < n; j++) {
    const rowJ = j * n;
    let pivot = a[rowJ + j]!;
    for (let k = 0; k < j; k++) pivot -= a[rowJ + k]! * a[rowJ + k]!;
    if (!(pivot > 0)) return false;
    const root = Math.sqrt(pivot);
    a[rowJ + j] = root;
    for (let i = j + 1; i < n; i++) {
      const rowI = i * n;
      let sum = a[rowI + j]!;
      for (let k = 0; k < j; k++) sum -= a[rowI + k]! * a[rowJ + k]!;
      a[rowI + j] = sum / root;
    }
  }
  return true;
}

/** Solves L y = b in place for the factor that `choleskyInPlace` left; |y|² is then bᵀ A⁻¹ b. */
export function forwardSubstitute(l: Float64Array, n: number, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = b[i]!;
    for (let k = 0; k < i; k++) sum -= l[i * n + k]! * b[k]!;
    b[i] = sum / l[i * n + i]!;
  }
}

/** Solves Lᵀ x = y in place: after `forwardSubstitute` this gives the solution of A x = b. */
export function backSubstitute(l: Float64Array, n: number, y: Float64Array): void {
  for (let i = n - 1; i >= 0; i--) {
    let sum = y[i]!;
    for (let k = i + 1; k < n; k++) sum -= l[k * n + i]! * y[k]!;
    y[i] = sum / l[i * n + i]!;
  }
}

/**
 * Solves A x = b for a symmetric positive definite A.
 *
 * @param a n × n, row after row; not changed
 * @param b length n; not changed
 * @returns x, or null when A is not positive definite
 */
export function solveSymmetric(a: ArrayLike<number>, b: ArrayLike<number>, n: number): Float64Array | null {
  const factor = Float64Array.from(a);
  if (!choleskyInPlace(factor, n)) return null;
  const x = Float64Array.from(b);
  forwardSubstitute(factor, n, x);
  backSubstitute(factor, n, x);
  return x;
}
