import { describe, expect, it } from 'vitest';
import type { Columns } from '../../../pipeline/measure/columns.ts';
import { solvePositiveDefinite } from '../../../pipeline/core/solve-positive-definite.ts';
import { solveNonNegative } from '../../../pipeline/measure/nnls.ts';

/** Small linear congruential generator (Numerical Recipes constants), so that failures can be repeated. */
function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

function dense(rows: readonly Float64Array[]): Columns {
  const n = rows[0]!.length;
  const values = new Float64Array(rows.length * n);
  rows.forEach((row, j) => {
    values.set(row, j * n);
  });
  return {
    count: rows.length,
    values,
    first: new Int32Array(rows.length),
    end: new Int32Array(rows.length).fill(n),
  };
}

/** The obvious twin: least squares on every subset of columns, best one whose amplitudes are all positive. */
function bestSubsetChiSquare(
  rows: readonly Float64Array[],
  data: Float64Array,
  weight: Float64Array,
): number {
  const dot = (a: Float64Array, b: Float64Array): number =>
    a.reduce((s, v, i) => s + weight[i]! * v * b[i]!, 0);
  let best = dot(data, data);
  for (let subset = 1; subset < 1 << rows.length; subset++) {
    const chosen = rows.filter((_, j) => (subset >> j) & 1);
    const matrix = chosen.map((a) => chosen.map((b) => dot(a, b)));
    const x = solvePositiveDefinite(
      matrix,
      chosen.map((a) => dot(a, data)),
    );
    if (x.some((v) => v < 0)) continue;
    const residual = data.map((d, i) => d - chosen.reduce((s, a, k) => s + x[k]! * a[i]!, 0));
    best = Math.min(best, dot(residual, residual));
  }
  return best;
}

describe('solveNonNegative()', () => {
  it('finds the chi-square of the best of all column subsets (200 random problems, seed 7)', () => {
    const random = generator(7);
    for (let trial = 0; trial < 200; trial++) {
      const rows = Array.from({ length: 6 }, () => Float64Array.from({ length: 25 }, () => random() - 0.3));
      const data = Float64Array.from({ length: 25 }, () => 2 * random() - 0.7);
      const weight = Float64Array.from({ length: 25 }, () => random() + 0.1);
      const fit = solveNonNegative(dense(rows), data, weight, new Float64Array(6));
      const oracle = bestSubsetChiSquare(rows, data, weight);
      // Columns that promise less than 1e-3 in chi-square are left out by design, at most five of them.
      expect(fit.chiSquare - oracle).toBeLessThan(6e-3);
      expect(fit.chiSquare - oracle).toBeGreaterThan(-1e-6);
      expect(Math.min(...fit.amplitudes, 1)).toBeGreaterThan(0);
    }
  });

  it('gives the same answer from any starting set', () => {
    const random = generator(11);
    const rows = Array.from({ length: 8 }, () => Float64Array.from({ length: 40 }, () => random()));
    const data = Float64Array.from({ length: 40 }, (_, i) => rows[1]![i]! + 2 * rows[5]![i]!);
    const weight = new Float64Array(40).fill(1);
    const none = new Float64Array(8);
    const cold = solveNonNegative(dense(rows), data, weight, none);
    const warm = solveNonNegative(dense(rows), data, weight, none, [0, 2, 3, 7]);
    expect(warm.chiSquare).toBeCloseTo(cold.chiSquare, 3);
    expect(cold.chiSquare).toBeLessThan(1e-3);
  });

  it('leaves out a column whose gain is below its price', () => {
    const signal = Float64Array.of(1, 1, 0, 0);
    const bump = Float64Array.of(0, 0, 1, 0);
    const data = Float64Array.of(5, 5, 1.5, 0);
    const weight = new Float64Array(4).fill(1);
    const cheap = solveNonNegative(dense([signal, bump]), data, weight, Float64Array.of(0, 0));
    const dear = solveNonNegative(dense([signal, bump]), data, weight, Float64Array.of(0, 3));
    expect(cheap.active).toEqual([0, 1]);
    expect(dear.active).toEqual([0]);
    expect(dear.chiSquare - cheap.chiSquare).toBeCloseTo(1.5 ** 2, 6);
  });

  it('returns an empty model when every column points away from the data', () => {
    const column = Float64Array.of(1, 1, 1);
    const fit = solveNonNegative(
      dense([column]),
      Float64Array.of(-1, -1, -1),
      new Float64Array(3).fill(1),
      new Float64Array(1),
    );
    expect(fit.active).toEqual([]);
    expect(fit.chiSquare).toBe(3);
  });
});
