import { choleskyInPlace, forwardSubstitute } from '../core/cholesky.ts';
import type { NormalEntries } from './normal-entries.ts';
import type { Nuisance, SearchData } from './search-data.ts';

/**
 * Ridge on the polynomials' Gram matrix, whose diagonal is at most 1: an arm may have no pixel inside. Far above
 * the rounding of the running sums (1e-16), far below the share of a single pixel (1e-4).
 */
const NUISANCE_RIDGE = 1e-12;

/**
 * Takes the polynomials out of the normal equations at a lag at which the family's grid covers data pixels
 * first .. end−1 only. The pixels inside are fitted by the family and polynomials, those outside by polynomials
 * of their own: every lag is judged on all the data, and a family gains nothing by looking away.
 *
 * @param t place of the lag in the entries, which are changed there
 * @returns chi-square of the polynomials alone, inside plus outside
 */
export function eliminateCovered(
  entries: NormalEntries,
  data: SearchData,
  t: number,
  first: number,
  end: number,
): number {
  let chiSquare = data.polynomialChiSquare;
  let before = 0;
  for (const nuisance of data.nuisances) {
    chiSquare -= eliminateInside(nuisance, before, first, end, entries, t);
    chiSquare -= explainedOutside(nuisance, first, end);
    before += nuisance.weightedRows.length;
  }
  return chiSquare;
}

/** Takes one arm's polynomials out of the normal equations of the pixels inside; returns what they explain. */
function eliminateInside(
  nuisance: Nuisance,
  before: number,
  first: number,
  end: number,
  { size, gram, right, nuisance: columns }: NormalEntries,
  t: number,
): number {
  const terms = nuisance.weightedRows.length;
  const { factor, data } = partOf(nuisance, first, end);
  if (!choleskyInPlace(factor, terms)) return 0;
  forwardSubstitute(factor, terms, data);
  const whitened = new Float64Array(size * terms);
  for (let k = 0; k < size; k++) {
    const column = whitened.subarray(k * terms, (k + 1) * terms);
    for (let p = 0; p < terms; p++) column[p] = columns[(before + p) * size + k]![t]!;
    forwardSubstitute(factor, terms, column);
    right[k]![t] = right[k]![t]! - dot(column, data);
    for (let j = 0; j <= k; j++) {
      const target = gram[k * size + j]!;
      target[t] = target[t]! - dot(column, whitened.subarray(j * terms, (j + 1) * terms));
    }
  }
  return dot(data, data);
}

/** Chi-square that the arm's polynomials take away from the pixels outside: those before and those behind. */
function explainedOutside(nuisance: Nuisance, first: number, end: number): number {
  const terms = nuisance.weightedRows.length;
  const below = partOf(nuisance, -Infinity, first);
  const above = partOf(nuisance, end, Infinity);
  for (let i = 0; i < below.factor.length; i++) below.factor[i] = below.factor[i]! + above.factor[i]!;
  for (let p = 0; p < terms; p++) below.data[p] = below.data[p]! + above.data[p]!;
  if (!choleskyInPlace(below.factor, terms)) return 0;
  forwardSubstitute(below.factor, terms, below.data);
  return dot(below.data, below.data);
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
  const to = Math.min(Math.max(end - nuisance.offset, from), length);
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
