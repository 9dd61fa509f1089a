import { choleskyInPlace, forwardSubstitute } from '../core/cholesky.ts';
import { explained, type NormalEntries } from './normal-entries.ts';
import type { Nuisance, SearchData } from './search-data.ts';

/**
 * Ridge on the polynomials' Gram matrix, whose diagonal is at most 1: an arm may have no pixel inside. Far above
 * the rounding of the running sums (1e-16), far below the share of a single pixel (1e-4).
 */
const NUISANCE_RIDGE = 1e-12;

/**
 * Chi-square at a lag at which the family's grid covers data pixels first .. end−1 only. The pixels inside are
 * fitted by the family and polynomials, those outside by polynomials of their own: every lag is judged on all
 * the data, and a family gains nothing by looking away.
 */
export function coveredChiSquare(
  entries: NormalEntries,
  data: SearchData,
  t: number,
  first: number,
  end: number,
): number {
  const { size, gram } = entries;
  const matrix = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    right[j] = entries.right[j]![t]!;
    for (let k = 0; k <= j; k++) matrix[j * size + k] = gram[j * size + k]?.[t] ?? 0;
  }
  let chiSquare = data.polynomialChiSquare;
  let before = 0;
  for (const nuisance of data.nuisances) {
    const terms = nuisance.weightedRows.length;
    const columns = Array.from({ length: size }, (_, k) =>
      Float64Array.from({ length: terms }, (_unused, p) => entries.nuisance[(before + p) * size + k]![t]!),
    );
    chiSquare -= eliminateInside(nuisance, first, end, columns, matrix, right);
    chiSquare -= explainedOutside(nuisance, first, end);
    before += terms;
  }
  return chiSquare - explained(matrix, right, size);
}

/** Takes one arm's polynomials out of the normal equations of the pixels inside; returns what they explain. */
function eliminateInside(
  nuisance: Nuisance,
  first: number,
  end: number,
  columns: readonly Float64Array[],
  matrix: Float64Array,
  right: Float64Array,
): number {
  const terms = nuisance.weightedRows.length;
  const { factor, data } = partOf(nuisance, first, end);
  if (!choleskyInPlace(factor, terms)) return 0;
  forwardSubstitute(factor, terms, data);
  for (const column of columns) forwardSubstitute(factor, terms, column);
  const size = columns.length;
  for (let j = 0; j < size; j++) {
    right[j] = right[j]! - dot(columns[j]!, data);
    for (let k = 0; k <= j; k++) matrix[j * size + k] = matrix[j * size + k]! - dot(columns[j]!, columns[k]!);
  }
  return dot(data, data);
}

/** Chi-square that the arm's polynomials take away from the pixels outside. */
function explainedOutside(nuisance: Nuisance, first: number, end: number): number {
  const terms = nuisance.weightedRows.length;
  const whole = partOf(nuisance, -Infinity, Infinity);
  const inside = partOf(nuisance, first, end);
  for (let i = 0; i < whole.factor.length; i++) whole.factor[i] = whole.factor[i]! - inside.factor[i]!;
  for (let p = 0; p < terms; p++) {
    whole.data[p] = whole.data[p]! - inside.data[p]!;
    whole.factor[p * terms + p] = whole.factor[p * terms + p]! + NUISANCE_RIDGE;
  }
  if (!choleskyInPlace(whole.factor, terms)) return 0;
  forwardSubstitute(whole.factor, terms, whole.data);
  return dot(whole.data, whole.data);
}

/** Gram matrix (lower triangle, with ridge) and data products of an arm's polynomials over axis pixels first .. end−1. */
function partOf(
  nuisance: Nuisance,
  first: number,
  end: number,
): { factor: Float64Array; data: Float64Array } {
  const terms = nuisance.weightedRows.length;
  const length = nuisance.weightedRows[0]?.length ?? 0;
  const from = Math.min(Math.max(first - nuisance.offset, 0), length);
  const to = Math.min(Math.max(end - nuisance.offset, 0), length);
  const factor = new Float64Array(terms * terms);
  const data = new Float64Array(terms);
  for (let p = 0, entry = 0; p < terms; p++) {
    data[p] = nuisance.dataSums[p]![to]! - nuisance.dataSums[p]![from]!;
    for (let r = 0; r <= p; r++, entry++) {
      const sums = nuisance.gramSums[entry]!;
      factor[p * terms + r] = sums[to]! - sums[from]! + (p === r ? NUISANCE_RIDGE : 0);
    }
  }
  return { factor, data };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
