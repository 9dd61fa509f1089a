import { describe, expect, it } from 'vitest';
import { chiSquareCurves } from '../../../pipeline/match/chi-square-curves.ts';
import { deepestMinima, type RedshiftCurve } from '../../../pipeline/match/minima.ts';

const STEP = Math.LN10 * 1e-4;
const curve = (values: number[], kind: RedshiftCurve['kind'] = 'galaxy', lnStart = 0): RedshiftCurve => ({
  kind,
  lnStart,
  step: STEP,
  chiSquare: Float64Array.from(values),
});

describe('deepestMinima()', () => {
  it('refines a parabola exactly and gives its 1-sigma', () => {
    // χ² = 50 + ((i − 20.3) / 2.5)²: Δχ² = 1 at 2.5 steps.
    const values = Array.from({ length: 41 }, (_, i) => 50 + ((i - 20.3) / 2.5) ** 2);
    const [minimum] = deepestMinima(curve(values), 3, 600);
    expect(minimum!.redshift).toBeCloseTo(Math.expm1(20.3 * STEP), 14);
    expect(minimum!.chiSquare).toBeCloseTo(50, 10);
    expect(minimum!.lnError).toBeCloseTo(2.5 * STEP, 12);
    expect(minimum!.atEdge).toBe(false);
  });

  it('keeps the deepest of two that are closer than the separation, and both when they are not', () => {
    // Minima at 10 and 15, 5 steps of 69 km/s apart.
    const values = Array.from({ length: 30 }, (_, i) => Math.min(Math.abs(i - 10), 1 + Math.abs(i - 15)));
    const at = (separation: number): number[] =>
      deepestMinima(curve(values), 9, separation).map(({ index }) => index);
    expect(at(400)).toEqual([10]);
    expect(at(300)).toEqual([10, 15]);
  });

  it('marks a minimum at either end of the range, and beside redshifts that were not tried', () => {
    expect(deepestMinima(curve([1, 2, 3]), 1, 0)[0]).toMatchObject({ index: 0, atEdge: true });
    expect(deepestMinima(curve([3, 2, 1]), 1, 0)[0]).toMatchObject({ index: 2, atEdge: true });
    expect(deepestMinima(curve([NaN, 1, 2]), 1, 0)[0]).toMatchObject({ index: 1, atEdge: true });
  });

  it('gives a flat bottom once, and nothing for an empty or untried curve', () => {
    expect(deepestMinima(curve([3, 1, 1, 1, 3]), 9, 0).length).toBe(1);
    expect(deepestMinima(curve([]), 9, 0)).toEqual([]);
    expect(deepestMinima(curve([NaN, NaN]), 9, 0)).toEqual([]);
  });
});

describe('chiSquareCurves()', () => {
  it('keeps the smallest value of every bin over all families of a kind', () => {
    const first = Array.from({ length: 1000 }, (_, i) => 100 + (i % 7));
    first[333] = 5;
    const second = Array.from({ length: 500 }, () => 102);
    second[400] = 3;
    const curves = chiSquareCurves(
      [curve(first), curve(second, 'galaxy', 800 * STEP), curve([9], 'star')],
      50,
    );
    expect(curves.map(({ kind }) => kind)).toEqual(['galaxy', 'star']);
    const galaxy = curves[0]!;
    expect(galaxy.chiSquare.length).toBe(50);
    const width = (1299 * STEP) / 50;
    const binOf = (steps: number): number => Math.floor((steps * STEP) / width);
    expect(galaxy.chiSquare[binOf(333)]).toBe(5);
    expect(galaxy.chiSquare[binOf(1200)]).toBe(3);
    expect(galaxy.redshift[0]).toBeCloseTo(Math.expm1(width / 2), 12);
    expect(curves[1]!.chiSquare[0]).toBe(9);
  });

  it('leaves NaN where nothing was tried', () => {
    const [only] = chiSquareCurves([curve([1, NaN, NaN, 2])], 4);
    expect([...only!.chiSquare].filter(Number.isNaN).length).toBeGreaterThan(0);
  });
});
