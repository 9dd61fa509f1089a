import { choleskyInPlace, forwardSubstitute } from '../core/cholesky.ts';

/** Ridge on the normal matrix, relative to its mean diagonal: rows that are nearly the same stay harmless. */
const RIDGE = 1e-9;

/** The entries of the normal equations, one array over lags each. */
export interface NormalEntries {
  readonly size: number;
  /** Σ w T_j T_k, j >= k, row after row; null where the product vanishes. */
  readonly gram: readonly (Float64Array | null)[];
  /** Σ w d T_k. */
  readonly right: readonly Float64Array[];
  /** Σ w q_p T_k, entry p × size + k. */
  readonly nuisance: readonly Float64Array[];
}

/** bᵀ (A + ridge)⁻¹ b, overwriting both; 0 when the templates are empty here. */
export function explained(matrix: Float64Array, right: Float64Array, size: number): number {
  let trace = 0;
  for (let j = 0; j < size; j++) trace += matrix[j * size + j]!;
  const ridge = (RIDGE * trace) / size;
  if (!(ridge > 0)) return 0;
  for (let j = 0; j < size; j++) matrix[j * size + j] = matrix[j * size + j]! + ridge;
  if (!choleskyInPlace(matrix, size)) return 0;
  forwardSubstitute(matrix, size, right);
  let sum = 0;
  for (let j = 0; j < size; j++) sum += right[j]! * right[j]!;
  return sum;
}
