import { choleskyInPlace, forwardSubstitute } from '../core/cholesky.ts';
import type { NormalEntries } from './normal-entries.ts';
import type { Nuisance, SearchData } from './search-data.ts';

/**
 * Ridge on the polynomials' Gram matrix, whose diagonal is at most 1: an arm may have no pixel inside. Far above
 * the rounding of the running sums (1e-16), far below the share of a single pixel (1e-4).
 */
const NUISANCE_RIDGE = 1e-12;

/** Scratch for one arm's polynomials. */
interface Room {
  readonly factor: Float64Array;
  readonly data: Float64Array;
  readonly columns: Float64Array;
}

/**
 * Takes the polynomials out of the normal equations at lags at which the family's grid covers only some of the
 * data. The pixels inside are fitted by the family and polynomials, those outside by polynomials of their own:
 * every lag is judged on all the data, and a family gains nothing by looking away.
 *
 * @returns a function of a lag's place in the entries (which it changes there) and of the covered data pixels
 *   first .. end−1; it gives the chi-square of the polynomials alone, inside plus outside
 */
export function partialElimination(
  entries: NormalEntries,
  data: SearchData,
): (t: number, first: number, end: number) => number {
  const terms = Math.max(0, ...data.nuisances.map(({ weightedRows }) => weightedRows.length));
  const room = {
    factor: new Float64Array(terms * terms),
    data: new Float64Array(terms),
    columns: new Float64Array(terms * entries.size),
  };
  return (t, first, end) => {
    let chiSquare = data.polynomialChiSquare;
    let before = 0;
    for (const nuisance of data.nuisances) {
      chiSquare -= eliminateInside(nuisance, before, first, end, entries, t, room);
      chiSquare -= explainedOutside(nuisance, first, end, room);
      before += nuisance.weightedRows.length;
    }
    return chiSquare;
  };
}

/** Takes one arm's polynomials out of the normal equations of the pixels inside; returns what they explain. */
function eliminateInside(
  nuisance: Nuisance,
  before: number,
  first: number,
  end: number,
  { size, gram, right, nuisance: entries }: NormalEntries,
  t: number,
  { factor, data, columns }: Room,
): number {
  const terms = nuisance.weightedRows.length;
  startWithRidge(terms, factor, data);
  addPart(nuisance, first, end, factor, data);
  if (!choleskyInPlace(factor, terms)) return 0;
  forwardSubstitute(factor, terms, data);
  for (let k = 0; k < size; k++) {
    // The column of template k, whitened like the data: L⁻¹ n_k.
    for (let p = 0; p < terms; p++) {
      let sum = entries[(before + p) * size + k]![t]!;
      for (let r = 0; r < p; r++) sum -= factor[p * terms + r]! * columns[k * terms + r]!;
      columns[k * terms + p] = sum / factor[p * terms + p]!;
    }
    for (let p = 0; p < terms; p++) right[k]![t] = right[k]![t]! - columns[k * terms + p]! * data[p]!;
    for (let j = 0; j <= k; j++) {
      let product = 0;
      for (let p = 0; p < terms; p++) product += columns[k * terms + p]! * columns[j * terms + p]!;
      gram[k * size + j]![t] = gram[k * size + j]![t]! - product;
    }
  }
  return squareOf(data, terms);
}

/** Chi-square that the arm's polynomials take away from the pixels outside: those before and those behind. */
function explainedOutside(nuisance: Nuisance, first: number, end: number, { factor, data }: Room): number {
  const terms = nuisance.weightedRows.length;
  startWithRidge(terms, factor, data);
  addPart(nuisance, -Infinity, first, factor, data);
  addPart(nuisance, end, Infinity, factor, data);
  if (!choleskyInPlace(factor, terms)) return 0;
  forwardSubstitute(factor, terms, data);
  return squareOf(data, terms);
}

function startWithRidge(terms: number, factor: Float64Array, data: Float64Array): void {
  factor.fill(0);
  data.fill(0);
  for (let p = 0; p < terms; p++) factor[p * terms + p] = NUISANCE_RIDGE;
}

/** Adds Gram matrix (lower triangle) and data products of an arm's polynomials over axis pixels first .. end−1. */
function addPart(
  nuisance: Nuisance,
  first: number,
  end: number,
  factor: Float64Array,
  data: Float64Array,
): void {
  const terms = nuisance.weightedRows.length;
  const length = nuisance.weightedRows[0]?.length ?? 0;
  const from = Math.min(Math.max(first - nuisance.offset, 0), length);
  const to = Math.min(Math.max(end - nuisance.offset, from), length);
  for (let p = 0, entry = 0; p < terms; p++) {
    data[p] = data[p]! + nuisance.dataSums[p]![to]! - nuisance.dataSums[p]![from]!;
    for (let r = 0; r <= p; r++, entry++) {
      const sums = nuisance.gramSums[entry]!;
      factor[p * terms + r] = factor[p * terms + r]! + sums[to]! - sums[from]!;
    }
  }
}

function squareOf(values: Float64Array, count: number): number {
  let sum = 0;
  for (let p = 0; p < count; p++) sum += values[p]! * values[p]!;
  return sum;
}
