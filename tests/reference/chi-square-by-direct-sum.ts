import { legendreRows } from '../../pipeline/core/legendre.ts';
import type { Grid } from '../../pipeline/grid/grid.ts';
import type { Family } from '../../templates/family.ts';

const RIDGE = 1e-9;

/**
 * The slow twin of the search: at one lag, builds every column (shifted template rows, each arm's Legendre
 * polynomials) pixel by pixel and solves the weighted least squares by Gauss-Jordan elimination. Pixels
 * outside the family's grid are fitted by polynomials of their own.
 *
 * @param lag template pixel − data pixel
 */
export function chiSquareByDirectSum(
  grid: Grid,
  family: Family,
  lag: number,
  mismatch: number,
  order: number,
): number {
  const inside = (axisPixel: number): boolean => axisPixel + lag >= 0 && axisPixel + lag < family.grid.length;
  const fit = fitPixels(grid, mismatch, order, inside, (axisPixel) =>
    family.basis.map((row) => row[axisPixel + lag]!),
  );
  const rest = fitPixels(
    grid,
    mismatch,
    order,
    (axisPixel) => !inside(axisPixel),
    () => [],
  );
  return fit + rest;
}

/** Weighted least squares over chosen pixels; the ridge goes to the template columns only, as in the search. */
function fitPixels(
  grid: Grid,
  mismatch: number,
  order: number,
  chosen: (axisPixel: number) => boolean,
  templatesAt: (axisPixel: number) => number[],
): number {
  const rows: number[][] = [];
  const flux: number[] = [];
  const weight: number[] = [];
  grid.arms.forEach((arm, a) => {
    const polynomials = legendreRows(arm.length, order);
    for (let i = 0; i < arm.length; i++) {
      if (!(arm.weight[i]! > 0) || !chosen(arm.offset + i)) continue;
      const own = grid.arms.flatMap((_, b) => polynomials.map((p) => (a === b ? p[i]! : 0)));
      rows.push([...own, ...templatesAt(arm.offset + i)]);
      flux.push(arm.flux[i]!);
      weight.push(1 / (1 / arm.weight[i]! + (mismatch * arm.level[i]!) ** 2));
    }
  });
  if (rows.length === 0) return 0;
  const polynomialColumns = grid.arms.length * (order + 1);
  const coefficients = solveWithSchurRidge(rows, flux, weight, polynomialColumns);
  let chiSquare = 0;
  rows.forEach((row, i) => {
    const model = row.reduce((sum, value, c) => sum + value * coefficients[c]!, 0);
    chiSquare += weight[i]! * (flux[i]! - model) ** 2;
  });
  return chiSquare;
}

/** Normal equations solved with the ridge measured on the matrix that is left after eliminating the polynomials. */
function solveWithSchurRidge(
  rows: number[][],
  flux: number[],
  weight: number[],
  polynomials: number,
): number[] {
  const size = rows[0]!.length;
  const matrix = Array.from({ length: size }, () => new Array<number>(size + 1).fill(0));
  rows.forEach((row, i) => {
    for (let j = 0; j < size; j++) {
      for (let k = 0; k < size; k++) matrix[j]![k]! += weight[i]! * row[j]! * row[k]!;
      matrix[j]![size]! += weight[i]! * row[j]! * flux[i]!;
    }
  });
  for (let pivot = 0; pivot < size; pivot++) {
    if (pivot === polynomials && polynomials < size) {
      let trace = 0;
      for (let j = polynomials; j < size; j++) trace += matrix[j]![j]!;
      for (let j = polynomials; j < size; j++) matrix[j]![j]! += (RIDGE * trace) / (size - polynomials);
    }
    const scale = matrix[pivot]![pivot]!;
    // A column without a pixel (an arm wholly on the other side) takes no part.
    if (scale === 0) continue;
    for (let k = pivot; k <= size; k++) matrix[pivot]![k]! /= scale;
    for (let j = 0; j < size; j++) {
      if (j === pivot) continue;
      const factor = matrix[j]![pivot]!;
      for (let k = pivot; k <= size; k++) matrix[j]![k]! -= factor * matrix[pivot]![k]!;
    }
  }
  return matrix.map((row) => row[size]!);
}
