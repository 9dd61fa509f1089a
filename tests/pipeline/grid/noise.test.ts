import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import type { Spectrum } from '../../../pipeline/decode/spectrum.ts';
import { exposureContext, NO_EXPOSURE_CONTEXT, toGrid } from '../../../pipeline/grid/index.ts';
import { checkNoise, joinNoiseChecks } from '../../../pipeline/grid/noise-check.ts';
import { spectrumOf } from '../../reference/synthetic-spectra.ts';

const N = 4000;

/** Noise of unit variance, smoothed so that neighbours correlate at b / (1 + b²), errors stated as 1 / factor. */
function noiseArm(
  seed: number,
  { b = 0, factor = 1, level = 0 } = {},
): { flux: Float64Array; inverseVariance: Float64Array } {
  const random = seededRandom(seed);
  let last = random.normal();
  const flux = Float64Array.from({ length: N }, () => {
    const next = random.normal();
    const value = (next + b * last) / Math.sqrt(1 + b * b);
    last = next;
    return level + value;
  });
  return { flux, inverseVariance: new Float64Array(N).fill(factor ** 2) };
}

function skySpectrum(seed: number, shape: { b?: number; factor?: number; level?: number }): Spectrum {
  return spectrumOf([
    {
      ...noiseArm(seed, shape),
      wavelengthVacuumAngstrom: Float64Array.from({ length: N }, (_, i) => 3700 + 1.4 * i),
    },
  ]);
}

describe('checkNoise()', () => {
  it.each([0.5, 1, 2])('finds white noise of %d times the stated error, without correlation', (factor) => {
    const { flux, inverseVariance } = noiseArm(41, { factor });
    const check = checkNoise(flux, inverseVariance)!;
    // Scatter of the mean of five robust sigmas of 4,000 pairs each: about 1.5 per cent.
    expect(Math.abs(check.factor / factor - 1)).toBeLessThan(0.045);
    // 1/√4000 = 0.016 each, less 1/51 for the median taken out.
    for (const rho of check.correlation) expect(Math.abs(rho)).toBeLessThan(0.07);
  });

  it('finds the lag-1 correlation of smoothed noise and does not let it lower the factor', () => {
    // b = 0.3: correlation 0.3 / 1.09 = 0.275; neighbours differ by √(1 − 0.275) = 0.85 of the stated error.
    const { flux, inverseVariance } = noiseArm(42, { b: 0.3 });
    const check = checkNoise(flux, inverseVariance)!;
    expect(Math.abs(check.correlation[0]! - 0.275)).toBeLessThan(0.05);
    expect(Math.abs(check.correlation[2]!)).toBeLessThan(0.07);
    expect(Math.abs(check.factor - 1)).toBeLessThan(0.045);
  });

  it('is not moved by spikes and lines in two per cent of the pixels', () => {
    const { flux, inverseVariance } = noiseArm(43);
    for (let i = 25; i < N; i += 50) flux[i] = 60;
    const check = checkNoise(flux, inverseVariance)!;
    expect(Math.abs(check.factor - 1)).toBeLessThan(0.08);
    expect(Math.abs(check.correlation[0]!)).toBeLessThan(0.07);
  });

  it('says nothing about objects too bright or too short to tell', () => {
    const bright = noiseArm(44, { level: 20 });
    expect(checkNoise(bright.flux, bright.inverseVariance)).toBeNull();
    const { flux, inverseVariance } = noiseArm(45);
    expect(checkNoise(flux.subarray(0, 200), inverseVariance.subarray(0, 200))).toBeNull();
    expect(joinNoiseChecks([null, null])).toBeNull();
  });
});

describe('toGrid() noise', () => {
  it('raises errors that are too small, and never lowers errors by its own scatter', () => {
    const small = toGrid(skySpectrum(46, { factor: 2 }), NO_EXPOSURE_CONTEXT);
    expect(small.noiseFrom).toBe('spectrum');
    expect(Math.abs(small.noiseFactor / 2 - 1)).toBeLessThan(0.05);
    const { inverseVariance, used } = small.arms[0]!.native;
    const at = used.indexOf(1);
    expect(inverseVariance[at]! * small.noiseFactor ** 2).toBeCloseTo(4, 1);
    const large = toGrid(skySpectrum(47, { factor: 0.5 }), NO_EXPOSURE_CONTEXT);
    expect(large.noiseFactor).toBe(1);
  });

  it('takes the exposure’s word, lower or higher', () => {
    const context = { noiseFactor: 0.8, noiseCorrelation: [0.2, 0, 0, 0, 0, 0], spectraUsed: 12 };
    const grid = toGrid(skySpectrum(48, {}), context);
    expect(grid.noiseFactor).toBe(0.8);
    expect(grid.noiseCorrelation).toEqual([0.2, 0, 0, 0, 0, 0]);
    expect(grid.noiseFrom).toBe('exposure');
  });

  it('says when the noise could not be measured', () => {
    const grid = toGrid(skySpectrum(49, { level: 30 }), NO_EXPOSURE_CONTEXT);
    expect(grid.noiseFrom).toBe('unmeasured');
    expect(grid.noiseFactor).toBe(1);
  });
});

describe('exposureContext()', () => {
  it('finds factor and correlation of an exposure from its sky fibres', () => {
    const spectra = Array.from({ length: 9 }, (_, k) => skySpectrum(50 + k, { b: 0.3, factor: 1.2 }));
    const context = exposureContext(spectra);
    expect(context.spectraUsed).toBe(9);
    // The median of nine checks: a third of the scatter of one.
    expect(Math.abs(context.noiseFactor! / 1.2 - 1)).toBeLessThan(0.02);
    expect(Math.abs(context.noiseCorrelation![0]! - 0.275)).toBeLessThan(0.03);
  });

  it('does not trust fewer than three fibres, and is not moved by one bad fibre of five', () => {
    expect(exposureContext([skySpectrum(60, {}), skySpectrum(61, {})])).toEqual({
      noiseFactor: null,
      noiseCorrelation: null,
      spectraUsed: 2,
    });
    const spectra = [1, 1, 6, 1, 1].map((factor, k) => skySpectrum(62 + k, { factor }));
    expect(Math.abs(exposureContext(spectra).noiseFactor! - 1)).toBeLessThan(0.04);
  });
});
