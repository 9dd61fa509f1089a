import { describe, expect, it } from 'vitest';
import { renderColumns } from '../../../pipeline/measure/columns.ts';
import { refitPixels } from '../../../pipeline/measure/refit-pixels.ts';
import type { Component } from '../../../templates/family.ts';

const GRID = { lnStart: Math.log(3000), step: 1e-4, length: 12_000 };

function component(flux: Float32Array, first = 0, end = flux.length): Component {
  return { label: 'test', role: 'continuum', group: '', flux, first, end };
}

function flatArm(from: number, step: number, length: number) {
  const wavelengthVacuumAngstrom = Float64Array.from({ length }, (_, i) => from + i * step);
  const ones = new Float64Array(length).fill(1);
  return { wavelengthVacuumAngstrom, flux: ones, inverseVariance: ones, level: new Float64Array(length) };
}

describe('renderColumns()', () => {
  it('puts a line at rest wavelength × (1 + z) and conserves its integral over ln λ', () => {
    const flux = new Float32Array(GRID.length);
    const centre = 4000;
    flux[centre] = 1;
    const restAngstrom = Math.exp(GRID.lnStart + centre * GRID.step);
    const redshift = 0.3;
    const pixels = refitPixels([flatArm(4500, 1.1, 2500)], 0);
    const columns = renderColumns([component(flux)], GRID, redshift, pixels);
    let area = 0;
    let moment = 0;
    for (let i = 0; i < pixels.count; i++) {
      const width = pixels.lnHigh[i]! - pixels.lnLow[i]!;
      area += columns.values[i]! * width;
      moment += columns.values[i]! * width * Math.exp(0.5 * (pixels.lnLow[i]! + pixels.lnHigh[i]!));
    }
    expect(area).toBeCloseTo(GRID.step, 12);
    // The centroid of a line narrower than a pixel is known to half a pixel.
    expect(Math.abs(moment / area - restAngstrom * (1 + redshift))).toBeLessThan(0.55);
  });

  it('gives a constant component the value one in every pixel it covers, in overlapping arms too', () => {
    const flux = new Float32Array(GRID.length).fill(1);
    const pixels = refitPixels([flatArm(3600, 1.2, 1900), flatArm(5700, 1.4, 2500)], 0);
    const columns = renderColumns([component(flux)], GRID, 0.05, pixels);
    for (let i = 0; i < pixels.count; i++) expect(columns.values[i]).toBeCloseTo(1, 6);
    expect(columns.first[0]).toBe(0);
    expect(columns.end[0]).toBe(pixels.count);
  });

  it('sees zero beyond the end of the component grid', () => {
    const flux = new Float32Array(GRID.length).fill(1);
    const pixels = refitPixels([flatArm(3600, 1, 6000)], 0);
    const columns = renderColumns([component(flux)], GRID, 1.5, pixels);
    const restStart = 3000 * (1 + 1.5);
    for (let i = 0; i < pixels.count; i++) {
      const lambda = Math.exp(pixels.lnHigh[i]!);
      if (lambda < restStart * (1 - 2e-4)) expect(columns.values[i]).toBe(0);
      if (lambda > restStart * (1 + 5e-4)) expect(columns.values[i]).toBeCloseTo(1, 6);
    }
  });
});

describe('refitPixels()', () => {
  it('refuses a spectrum without a usable pixel', () => {
    const arm = flatArm(4000, 1, 10);
    expect(() => refitPixels([{ ...arm, inverseVariance: new Float64Array(10) }], 0.02)).toThrow(RangeError);
  });

  it('adds the mismatch variance once: weight = scale² / (1/ivar + (mismatch × level)²)', () => {
    const arm = { ...flatArm(4000, 1, 3), level: Float64Array.of(10, 10, 10) };
    const pixels = refitPixels([arm], 0.1);
    expect(pixels.weight[1]).toBeCloseTo(pixels.fluxScale ** 2 / (1 + 1), 12);
  });
});
