import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { refine } from '../../../pipeline/measure/refine.ts';
import { Refitter } from '../../../pipeline/measure/refit.ts';
import { type RefitPixels, refitPixels } from '../../../pipeline/measure/refit-pixels.ts';
import { renderColumns } from '../../../pipeline/measure/columns.ts';
import { shiftBound } from '../../reference/shift-bound.ts';
import type { Component, Family } from '../../../templates/family.ts';

const C = 299_792.458;
const SEED = 20310402;
const GRID = { lnStart: Math.log(3800), step: 1e-4, length: 8000 };

/** A flat continuum with 60 absorption lines of 80 km/s: an invented star with well-spread information. */
function lineForest(): Float32Array {
  const random = seededRandom(SEED);
  const flux = new Float64Array(GRID.length).fill(1);
  for (let k = 0; k < 60; k++) {
    const centre = 300 + random.uniform() * (GRID.length - 600);
    const depth = 0.1 + 0.4 * random.uniform();
    const sigma = 80 / C / GRID.step;
    for (let i = Math.floor(centre - 30); i < centre + 30; i++) {
      flux[i]! -= depth * Math.exp(-0.5 * ((i - centre) / sigma) ** 2);
    }
  }
  return Float32Array.from(flux);
}

const FOREST = lineForest();
const COMPONENT: Component = {
  label: 'forest',
  role: 'continuum',
  group: '',
  flux: FOREST,
  first: 0,
  end: FOREST.length,
};
const FAMILY: Family = {
  name: 'star-forest',
  kind: 'star',
  grid: GRID,
  componentGrid: GRID,
  basis: [],
  redshiftMin: -0.01,
  redshiftMax: 0.01,
  refitSet: 'star-forest',
  componentsAt: () => [COMPONENT],
  multiplicativeOrder: 3,
  additiveOrder: -1,
  mismatch: 0,
};

/** The forest at a redshift on 1 Å pixels with white noise of the given signal-to-noise per pixel. */
function observe(redshift: number, signalToNoise: number, normal: () => number): RefitPixels {
  const length = 3000;
  const wavelengthVacuumAngstrom = Float64Array.from({ length }, (_, i) => 4300 + i);
  const level = new Float64Array(length);
  const inverseVariance = new Float64Array(length).fill(signalToNoise ** 2);
  const flux = new Float64Array(length).fill(1);
  const clean = refitPixels([{ wavelengthVacuumAngstrom, flux, inverseVariance, level }], 0);
  const model = renderColumns([COMPONENT], GRID, redshift, clean).values;
  const noisy = Float64Array.from(model.subarray(0, length), (m) => m + normal() / signalToNoise);
  return refitPixels([{ wavelengthVacuumAngstrom, flux: noisy, inverseVariance, level }], 0);
}

/**
 * Cramér–Rao bound of a shift, white noise, continuum and amplitude projected out (they are nearly orthogonal
 * to the derivative of many narrow lines): var = sigma² / Σ (dT/dx)².
 */
function boundKmS(redshift: number, signalToNoise: number): number {
  const pixels = observe(redshift, 1e9, () => 0);
  const h = 1 / C;
  const up = renderColumns([COMPONENT], GRID, redshift + h, pixels).values;
  const down = renderColumns([COMPONENT], GRID, redshift - h, pixels).values;
  const derivative = Float64Array.from(up, (v, i) => (v - down[i]!) / 2);
  return shiftBound(derivative, () => 1 / signalToNoise);
}

describe('refine()', () => {
  it(`measures a shift with the precision of the Cramér–Rao bound and says so (seed ${SEED})`, () => {
    const random = seededRandom(SEED + 1);
    const trials = 150;
    const signalToNoise = 6;
    const truth = 0.0004;
    const errors: number[] = [];
    const stated: number[] = [];
    for (let t = 0; t < trials; t++) {
      const pixels = observe(truth, signalToNoise, () => random.normal());
      const refitter = new Refitter(pixels);
      const start = refitter.at(FAMILY, truth + ((random.uniform() - 0.5) * 100) / C);
      const { refit, sigmaKmS } = refine(refitter, FAMILY, start);
      errors.push((refit.redshift - truth) * C);
      stated.push(sigmaKmS ?? NaN);
    }
    const rms = Math.sqrt(errors.reduce((s, e) => s + e * e, 0) / trials);
    const meanError = errors.reduce((s, e) => s + e, 0) / trials;
    const meanStated = stated.reduce((s, e) => s + e, 0) / trials;
    const bound = boundKmS(truth, signalToNoise);
    // The scatter of an rms over 150 trials is 1/√300 = 6 per cent; three of those, and 5 per cent for the
    // projected continuum.
    expect(rms / bound).toBeGreaterThan(0.82);
    expect(rms / bound).toBeLessThan(1.23);
    expect(meanStated / rms).toBeGreaterThan(0.82);
    expect(meanStated / rms).toBeLessThan(1.23);
    expect(Math.abs(meanError)).toBeLessThan((3.5 * rms) / Math.sqrt(trials));
  });

  it('says so when the walk reaches the edge of the family range', () => {
    const random = seededRandom(SEED + 2);
    const pixels = observe(0.0099, 30, () => random.normal());
    const narrow = { ...FAMILY, redshiftMax: 0.0095 };
    const refitter = new Refitter(pixels);
    const found = refine(refitter, narrow, refitter.at(narrow, 0.0094));
    expect(found.atEdge).toBe(true);
    // The same bottom inside the wider range of a set of windows is no edge.
    expect(refine(refitter, narrow, refitter.at(narrow, 0.0094), FAMILY).atEdge).toBe(false);
  });
});
