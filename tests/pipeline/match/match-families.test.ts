import { describe, expect, it } from 'vitest';
import { NO_EXPOSURE_CONTEXT, toGrid } from '../../../pipeline/grid/index.ts';
import { DEFAULT_MATCH_OPTIONS, matchFamilies } from '../../../pipeline/match/index.ts';
import { chiSquareByDirectSum } from '../../reference/chi-square-by-direct-sum.ts';
import {
  armFromFamily,
  FAMILY_FIRST_STEP,
  spectrumOf,
  syntheticFamily,
} from '../../reference/synthetic-spectra.ts';

const MISMATCH = DEFAULT_MATCH_OPTIONS.mismatch;
const options = { ...DEFAULT_MATCH_OPTIONS, polynomialOrder: 1 };

describe('matchFamilies()', () => {
  it('gives the chi-square of a direct sum at every lag, to 1e-9, for one arm wholly covered', () => {
    const family = syntheticFamily(1, 'galaxy', { rows: 4, length: 3000, redshiftMin: 0, redshiftMax: 0.2 });
    const arm = armFromFamily(family, FAMILY_FIRST_STEP + 1000, 1200, 700, 0.1, 2);
    const grid = toGrid(spectrumOf([arm]), NO_EXPOSURE_CONTEXT);
    const match = matchFamilies(grid, [family], options);
    const curve = match.families[0]!;
    expect(curve.chiSquare.length).toBeGreaterThan(700);
    let worst = 0;
    for (let i = 0; i < curve.chiSquare.length; i += 13) {
      const lag = lagOf(grid.lnStart, family.grid.lnStart, curve.lnStart + i * grid.step, grid.step);
      const direct = chiSquareByDirectSum(grid, family, lag, MISMATCH, 1);
      worst = Math.max(worst, Math.abs(curve.chiSquare[i]! / direct - 1));
    }
    expect(worst).toBeLessThan(1e-9);
  });

  it('gives the chi-square of a direct sum, to 1e-7, for overlapping arms that the family covers in part', () => {
    const family = syntheticFamily(3, 'quasar', { rows: 3, length: 1500, redshiftMin: 0, redshiftMax: 0.4 });
    const blue = armFromFamily(family, FAMILY_FIRST_STEP + 900, 700, 400, 0.1, 4);
    const red = armFromFamily(family, FAMILY_FIRST_STEP + 1550, 600, 1050, 0.1, 5);
    const grid = toGrid(spectrumOf([blue, red]), NO_EXPOSURE_CONTEXT);
    expect(grid.arms.length).toBe(2);
    const match = matchFamilies(grid, [family], options);
    const curve = match.families[0]!;
    let worst = 0;
    let partly = 0;
    for (let i = 0; i < curve.chiSquare.length; i += 13) {
      if (Number.isNaN(curve.chiSquare[i])) continue;
      if (curve.covered[i]! < 1) partly++;
      const lag = lagOf(grid.lnStart, family.grid.lnStart, curve.lnStart + i * grid.step, grid.step);
      const direct = chiSquareByDirectSum(grid, family, lag, MISMATCH, 1);
      worst = Math.max(worst, Math.abs(curve.chiSquare[i]! / direct - 1));
    }
    expect(partly).toBeGreaterThan(20);
    // The search puts a ridge of 1e-12 on the polynomials, the direct sum none. Where only a few pixels lie
    // outside, their Gram matrix has eigenvalues near 1e-4, and 1e-8 of their part of chi-square is left.
    expect(worst).toBeLessThan(1e-7);
  });
});

function lagOf(dataStart: number, familyStart: number, lnShift: number, step: number): number {
  return Math.round((dataStart - familyStart - lnShift) / step);
}
