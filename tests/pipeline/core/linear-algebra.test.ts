import { describe, expect, it } from 'vitest';
import { choleskyInPlace, forwardSubstitute, solveSymmetric } from '../../../pipeline/core/cholesky.ts';
import { weightedGram } from '../../../pipeline/core/gram.ts';
import { legendreRows } from '../../../pipeline/core/legendre.ts';
import { parabolaVertex } from '../../../pipeline/core/parabola.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';

describe('choleskyInPlace()', () => {
  it('gives the factor numpy.linalg.cholesky gives', () => {
    // numpy 1.x: cholesky([[4,2,-2],[2,10,2],[-2,2,6]]).
    const a = Float64Array.from([4, 2, -2, 2, 10, 2, -2, 2, 6]);
    expect(choleskyInPlace(a, 3)).toBe(true);
    expect([a[0], a[3], a[4], a[6], a[7], a[8]]).toEqual([2, 1, 3, -1, 1, 2]);
  });

  it.each([[[0]], [[-1]], [[NaN]], [[1, 2, 2, 1]]])('says no to %j, which is not positive definite', (a) => {
    expect(choleskyInPlace(Float64Array.from(a), Math.sqrt(a.length))).toBe(false);
  });
});

describe('solveSymmetric()', () => {
  it('solves random normal equations: A x is b again', () => {
    const random = seededRandom(11);
    const rows = Array.from({ length: 6 }, () => Float64Array.from({ length: 40 }, () => random.normal()));
    const weight = Float64Array.from({ length: 40 }, () => random.uniform());
    const a = weightedGram(rows, weight);
    const b = Float64Array.from({ length: 6 }, () => random.normal());
    const x = solveSymmetric(a, b, 6)!;
    for (let j = 0; j < 6; j++) {
      const product = x.reduce((sum, v, k) => sum + a[j * 6 + k]! * v, 0);
      expect(product).toBeCloseTo(b[j]!, 12);
    }
  });

  it('gives null for a singular matrix', () => {
    expect(solveSymmetric([1, 1, 1, 1], [1, 1], 2)).toBeNull();
  });
});

describe('forwardSubstitute()', () => {
  it('leaves a vector whose square is bᵀ A⁻¹ b', () => {
    const l = Float64Array.from([4, 2, 2, 10]);
    choleskyInPlace(l, 2);
    const y = Float64Array.from([3, -1]);
    forwardSubstitute(l, 2, y);
    // A⁻¹ = [10 −2; −2 4] / 36: bᵀ A⁻¹ b = (90 + 12 + 4) / 36.
    expect(y[0]! ** 2 + y[1]! ** 2).toBeCloseTo(106 / 36, 14);
  });
});

describe('legendreRows()', () => {
  it('gives the values of Abramowitz & Stegun (1964), 22.5.35, at −1, 0 and 1 and at 0.5', () => {
    const rows = legendreRows(5, 4);
    expect(rows.map((row) => row[0])).toEqual([1, -1, 1, -1, 1]);
    expect(rows.map((row) => row[4])).toEqual([1, 1, 1, 1, 1]);
    const atHalf = rows.map((row) => row[3]!);
    [1, 0.5, -0.125, -0.4375, -0.2890625].forEach((value, p) => {
      expect(atHalf[p]).toBeCloseTo(value, 15);
    });
  });

  it('gives no row for order −1 and a middle value for a single place', () => {
    expect(legendreRows(7, -1)).toEqual([]);
    expect(legendreRows(1, 2).map((row) => row[0])).toEqual([1, 0, -0.5]);
  });
});

describe('parabolaVertex()', () => {
  it('finds the vertex of 3 (x − 0.2)² − 7 exactly', () => {
    const y = (x: number): number => 3 * (x - 0.2) ** 2 - 7;
    const vertex = parabolaVertex(y(-1), y(0), y(1))!;
    expect(vertex.offset).toBeCloseTo(0.2, 14);
    expect(vertex.value).toBeCloseTo(-7, 13);
    expect(vertex.curvature).toBeCloseTo(6, 13);
  });

  it.each([
    [1, 2, 3],
    [NaN, 1, 2],
    [Infinity, 1, 2],
  ])('gives null for %d, %d, %d: no vertex', (a, b, c) => {
    expect(parabolaVertex(a, b, c)).toBeNull();
  });
});
