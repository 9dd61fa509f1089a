import { describe, expect, it } from 'vitest';
import {
  averagePairs,
  gridThrough,
  laidInto,
  meanOver,
  pairedGrid,
  pixelAt,
  stepKmS,
  wavelengthsOf,
} from '../../../templates/prepare/log-grid.ts';
import { STORED_GRID } from '../../../templates/stars/stored-grid.ts';

describe('grids', () => {
  it('step by 34.5 km/s as stored and twice that in the search', () => {
    expect(stepKmS(STORED_GRID)).toBeCloseTo(34.515, 3);
    expect(stepKmS(pairedGrid(STORED_GRID))).toBeCloseTo(69.03, 2);
  });

  it('pairedGrid() puts each centre between those of its two pixels', () => {
    const fine = wavelengthsOf(STORED_GRID);
    const paired = wavelengthsOf(pairedGrid(STORED_GRID));
    expect(paired[100]).toBeCloseTo(Math.sqrt(fine[200]! * fine[201]!), 8);
    expect(averagePairs(Float32Array.of(1, 3, 5, 9, 100))).toEqual(Float32Array.of(2, 7));
  });

  it('gridThrough() lines up with the other grid, covers the range and keeps pairs together', () => {
    const grid = gridThrough(STORED_GRID, 700, 10_600);
    const offset = (STORED_GRID.lnStart - grid.lnStart) / grid.step;
    expect(Math.abs(offset - Math.round(offset))).toBeLessThan(1e-6);
    expect(Math.round(offset) % 2).toBe(0);
    expect(grid.length % 2).toBe(0);
    const wavelengths = wavelengthsOf(grid);
    expect(wavelengths[0]).toBeLessThanOrEqual(700);
    expect(wavelengths.at(-1)).toBeGreaterThanOrEqual(10_600);
  });

  it('laidInto() puts every value at its own wavelength and zeros elsewhere', () => {
    const grid = gridThrough(STORED_GRID, 1300, 2000);
    const flux = Float32Array.from(wavelengthsOf(STORED_GRID));
    const laid = laidInto(grid, STORED_GRID, flux);
    wavelengthsOf(grid).forEach((wavelength, i) => {
      const expected = wavelength < 1459.9 ? 0 : wavelength;
      expect(Math.abs(laid[i]! - expected)).toBeLessThan(1e-3);
    });
  });

  it('meanOver() averages pixels with centres in the band, NaN for a band without any', () => {
    const grid = { lnStart: Math.log(1000), step: 0.01, length: 5 };
    expect(meanOver(grid, [1, 2, 3, 4, 5], 1005, 1035)).toBe(3);
    expect(meanOver(grid, [1, 2, 3, 4, 5], 2000, 2100)).toBeNaN();
    expect(pixelAt(grid, 1000 * Math.exp(0.025))).toBeCloseTo(2.5, 9);
  });
});
