import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { gramOf } from './gram-of.ts';
import { toUnitRms } from './unit-rows.ts';

/** Eigenvalues below this fraction of the largest are rounding of 32-bit spectra, not shapes. */
const SMALLEST_EIGENVALUE = 1e-10;

/**
 * The leading right singular vectors of a set of spectra, not centred: the best linear basis of a given size
 * in the least-squares sense (Eckart & Young 1936). Through the eigenvectors of the small Gram matrix R W Rᵀ.
 *
 * @param rows N spectra of equal length
 * @param count how many vectors; fewer come back when the spectra span fewer dimensions
 * @param weight per pixel, ≥ 0, default 1: what is fitted best. The vectors still reach over all pixels
 * @returns unit-rms rows, most important first, the sign such that the mean is not negative
 */
export function principalVectors(
  rows: readonly Float32Array[],
  count: number,
  weight?: Float64Array,
): Float32Array[] {
  const size = rows.length;
  if (size === 0) throw new RangeError('principalVectors must be given at least one spectrum, got none');
  const weighted = weight ? rows.map((row) => row.map((value, i) => value * Math.sqrt(weight[i]!))) : rows;
  const gram = Matrix.from1DArray(size, size, gramOf(weighted));
  const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(gram, { assumeSymmetric: true });
  const order = realEigenvalues.map((_, i) => i).sort((a, b) => realEigenvalues[b]! - realEigenvalues[a]!);
  const smallest = SMALLEST_EIGENVALUE * realEigenvalues[order[0]!]!;
  return order
    .slice(0, count)
    .filter((k) => realEigenvalues[k]! > smallest)
    .map((k) => {
      const coefficients = eigenvectorMatrix.getColumn(k);
      return withPositiveMean(toUnitRms(combine(rows, coefficients)));
    });
}

/** Σ_j coefficient_j row_j, summed in double precision. */
function combine(rows: readonly Float32Array[], coefficients: readonly number[]): Float32Array {
  const sum = new Float64Array(rows[0]!.length);
  rows.forEach((row, j) => {
    const coefficient = coefficients[j]!;
    for (let i = 0; i < sum.length; i++) sum[i]! += coefficient * row[i]!;
  });
  return Float32Array.from(sum);
}

function withPositiveMean(vector: Float32Array): Float32Array {
  let sum = 0;
  for (const value of vector) sum += value;
  return sum < 0 ? vector.map((value) => -value) : vector;
}
