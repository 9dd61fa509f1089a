import { choleskyInPlace } from '../core/cholesky.ts';
import { weightedGram } from '../core/gram.ts';
import { legendreRows } from '../core/legendre.ts';
import type { Grid, GridArm } from '../grid/grid.ts';
import type { MatchOptions } from './match-options.ts';

/** Span in ln(wavelength) of 3,600 to 9,300 Å, the range on which the polynomial order was tried. */
const FULL_SPAN = 0.95;

/** One arm's additive polynomial, orthonormal under the arm's weights. */
export interface Nuisance {
  readonly offset: number;
  /** Rows w·q_p on the arm's pixels; Σ w q_p q_r = 1 for p = r, else 0. */
  readonly weightedRows: readonly Float64Array[];
  /** Running sums over the arm's pixels, starting with 0: w q_p q_r (p >= r, row after row). */
  readonly gramSums: readonly Float64Array[];
  /** Running sums of w q_p d. */
  readonly dataSums: readonly Float64Array[];
}

/** What every family is compared with: all arms on one axis, the polynomials' part already taken out. */
export interface SearchData {
  readonly length: number;
  /** Σ over arms of w; w includes the mismatch term. */
  readonly weight: Float64Array;
  /** Σ over arms of w·d, with d the residual of the best polynomials. */
  readonly weightedFlux: Float64Array;
  readonly nuisances: readonly Nuisance[];
  /** Running sums of w d² and of w over the axis, starting with 0. */
  readonly squareSums: Float64Array;
  readonly weightSums: Float64Array;
  /** Chi-square of the polynomials alone. */
  readonly polynomialChiSquare: number;
  readonly polynomialTerms: number;
  /** Pixels with weight, over all arms. */
  readonly pixels: number;
}

/**
 * Prepares a spectrum for the search.
 *
 * Subtracting the polynomials from the data first changes no chi-square (they are free at every lag) and
 * spares the cancellation between large sums.
 */
export function prepareSearch(grid: Grid, options: MatchOptions): SearchData {
  const weight = new Float64Array(grid.length);
  const weightedFlux = new Float64Array(grid.length);
  const square = new Float64Array(grid.length);
  let pixels = 0;
  const scale = typicalFlux(grid);
  const nuisances = grid.arms.map((arm) => {
    const w = Float64Array.from(arm.weight, (v, i) =>
      v > 0 ? scale ** 2 / (1 / v + (options.mismatch * arm.level[i]!) ** 2) : 0,
    );
    const rows = orthonormalRows(arm, w, grid.step, options.polynomialOrder);
    const residual = subtractProjection(arm.flux, rows, w).map((d) => d / scale);
    for (let i = 0; i < arm.length; i++) {
      const j = arm.offset + i;
      weight[j] = weight[j]! + w[i]!;
      weightedFlux[j] = weightedFlux[j]! + w[i]! * residual[i]!;
      square[j] = square[j]! + w[i]! * residual[i]! * residual[i]!;
      if (w[i]! > 0) pixels++;
    }
    return nuisanceOf(arm.offset, rows, w, residual);
  });
  const squareSums = runningSum(square);
  return {
    length: grid.length,
    weight,
    weightedFlux,
    nuisances,
    squareSums,
    weightSums: runningSum(weight),
    polynomialChiSquare: squareSums[grid.length]!,
    polynomialTerms: nuisances.reduce((sum, { weightedRows }) => sum + weightedRows.length, 0),
    pixels,
  };
}

/**
 * Weighted rms flux: fluxes are divided by it, because weights and fluxes share transforms (two reals in one
 * complex) and must not differ by more than a double can hold.
 */
function typicalFlux(grid: Grid): number {
  let sum = 0;
  let total = 0;
  for (const arm of grid.arms) {
    for (let i = 0; i < arm.length; i++) {
      sum += arm.weight[i]! * arm.flux[i]! ** 2;
      total += arm.weight[i]!;
    }
  }
  return sum > 0 ? Math.sqrt(sum / total) : 1;
}

/** Legendre polynomials over the arm, made orthonormal under w by the Cholesky factor of their Gram matrix. */
function orthonormalRows(arm: GridArm, w: Float64Array, step: number, fullOrder: number): Float64Array[] {
  const span = arm.length * step;
  const wanted = Math.min(fullOrder, Math.max(1, Math.round((fullOrder * span) / FULL_SPAN)));
  for (let order = fullOrder < 0 ? -1 : wanted; order >= 0; order--) {
    const rows = legendreRows(arm.length, order);
    const size = rows.length;
    const factor = weightedGram(rows, w);
    if (!choleskyInPlace(factor, size)) continue;
    for (let p = 0; p < size; p++) {
      const row = rows[p]!;
      for (let r = 0; r < p; r++) {
        const share = factor[p * size + r]!;
        for (let i = 0; i < row.length; i++) row[i] = row[i]! - share * rows[r]![i]!;
      }
      for (let i = 0; i < row.length; i++) row[i] = row[i]! / factor[p * size + p]!;
    }
    return rows;
  }
  return [];
}

/** d − Σ_p q_p Σ_i w q_p d, twice: the second pass removes what rounding left. */
function subtractProjection(
  flux: Float64Array,
  rows: readonly Float64Array[],
  w: Float64Array,
): Float64Array {
  const residual = flux.slice();
  for (let pass = 0; pass < 2; pass++) {
    for (const row of rows) {
      let share = 0;
      for (let i = 0; i < w.length; i++) share += w[i]! * row[i]! * residual[i]!;
      for (let i = 0; i < w.length; i++) residual[i] = residual[i]! - share * row[i]!;
    }
  }
  return residual;
}

function nuisanceOf(
  offset: number,
  rows: readonly Float64Array[],
  w: Float64Array,
  residual: Float64Array,
): Nuisance {
  const weightedRows = rows.map((row) => row.map((q, i) => q * w[i]!));
  const gramSums: Float64Array[] = [];
  for (let p = 0; p < rows.length; p++) {
    for (let r = 0; r <= p; r++) gramSums.push(runningSum(weightedRows[p]!.map((q, i) => q * rows[r]![i]!)));
  }
  const dataSums = weightedRows.map((row) => runningSum(row.map((q, i) => q * residual[i]!)));
  return { offset, weightedRows, gramSums, dataSums };
}

/** Sums of the first 0, 1, .. n values. */
function runningSum(values: Float64Array): Float64Array {
  const sums = new Float64Array(values.length + 1);
  for (let i = 0; i < values.length; i++) sums[i + 1] = sums[i]! + values[i]!;
  return sums;
}
