import { describe, expect, it } from 'vitest';
import { STORED_GRID, STORED_SIGMA_KM_S, toStoredGrid } from '../../../templates/stars/stored-grid.ts';
import { synthesisGrid } from '../../../templates/stars/synthesize-star.ts';

const FINE = synthesisGrid({ pixelKmS: 3, depths: 48, startAngstrom: 1450, endAngstrom: 10700 });
const wavelength = (i: number): number => Math.exp(STORED_GRID.lnStart + i * STORED_GRID.step);

describe('STORED_GRID', () => {
  it('runs from 1460 to 10,600 A in steps of 34.5 km/s', () => {
    expect(wavelength(0)).toBeCloseTo(1460, 6);
    expect(wavelength(STORED_GRID.length - 1)).toBeGreaterThan(10598);
    expect(wavelength(STORED_GRID.length - 1)).toBeLessThan(10600);
    expect(STORED_GRID.step * 299792.458).toBeCloseTo(34.51, 2);
  });
});

describe('toStoredGrid', () => {
  it('keeps a constant', () => {
    const stored = toStoredGrid(new Float64Array(FINE.length).fill(2), FINE);
    expect(Math.max(...stored)).toBeCloseTo(2, 6);
    expect(Math.min(...stored)).toBeCloseTo(2, 6);
  });

  it('keeps area and centre of a narrow line and gives it the stored width', () => {
    const flux = new Float64Array(FINE.length);
    const at = 150_000;
    flux[at] = 1;
    const centre = FINE.lnStart + at * FINE.step;
    const stored = toStoredGrid(flux, FINE);
    let area = 0;
    let first = 0;
    let second = 0;
    for (const [i, value] of stored.entries()) {
      const shift = STORED_GRID.lnStart + i * STORED_GRID.step - centre;
      area += value;
      first += value * shift;
      second += value * shift * shift;
    }
    expect((area * STORED_GRID.step) / FINE.step).toBeCloseTo(1, 4);
    expect(Math.abs(first / area)).toBeLessThan(0.01 * STORED_GRID.step);
    // Gaussian and pixel boxes add in quadrature: 25^2 + (34.5^2 + 3^2) / 12.
    const sigma = Math.sqrt(second / area) * 299792.458;
    expect(sigma).toBeCloseTo(Math.sqrt(STORED_SIGMA_KM_S ** 2 + (34.51 ** 2 + 3 ** 2) / 12), 0);
  });
});
