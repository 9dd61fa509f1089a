import { describe, expect, it } from 'vitest';
import { median } from '../../../pipeline/core/quantile.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { estimateInverseVariance } from '../../../pipeline/decode/estimate-noise.ts';

const PIXELS = 4000;
const ALL = new Uint8Array(PIXELS).fill(1);
const sigmas = (weights: Float64Array): Float64Array => weights.map((weight) => 1 / Math.sqrt(weight));

/**
 * The median of 101 absolute deviations has a relative scatter of 1.17/sqrt(101) = 12 %; windows overlap, so the
 * median over 40 independent windows is known to 1.253 * 12 % / sqrt(40) = 2.3 %, three of which are 7 %.
 */
const TOLERANCE = 0.07;

describe('estimateInverseVariance', () => {
  it('finds the width of white noise on a steep continuum', () => {
    const random = seededRandom(11);
    const flux = Float64Array.from(ALL, (_, i) => 50 + 0.1 * i + 1e-5 * i * i + 2 * random.normal());
    expect(Math.abs(median(sigmas(estimateInverseVariance(flux, ALL))) / 2 - 1)).toBeLessThan(TOLERANCE);
  });

  it('is not fooled by neighbours that correlate at 0.27', () => {
    const random = seededRandom(12);
    const white = Float64Array.from({ length: PIXELS + 1 }, () => random.normal());
    // x[i] = a w[i] + b w[i+1], a² + b² = 1, ab = 0.27: lag-1 correlation 0.27, none beyond.
    const a = Math.sqrt((1 + Math.sqrt(1 - 4 * 0.27 ** 2)) / 2);
    const b = 0.27 / a;
    const flux = Float64Array.from(ALL, (_, i) => a * white[i]! + b * white[i + 1]!);
    expect(Math.abs(median(sigmas(estimateInverseVariance(flux, ALL))) - 1)).toBeLessThan(TOLERANCE);
  });

  it('follows noise that rises threefold in a band of sky lines', () => {
    const random = seededRandom(13);
    const isBand = (i: number): boolean => i >= 2000 && i < 2600;
    const flux = Float64Array.from(ALL, (_, i) => (isBand(i) ? 3 : 1) * random.normal());
    const found = sigmas(estimateInverseVariance(flux, ALL));
    expect(Math.abs(median(found.slice(2100, 2500)) / 3 - 1)).toBeLessThan(0.2);
    expect(Math.abs(median(found.slice(0, 1900)) - 1)).toBeLessThan(0.1);
  });

  it('gives no weight to pixels left out, to constant spectra and to spectra of a few pixels', () => {
    const random = seededRandom(14);
    const flux = Float64Array.from(ALL, () => random.normal());
    const usable = ALL.map((_, i) => (i % 7 === 0 ? 0 : 1));
    const weights = estimateInverseVariance(flux, usable);
    expect(weights.every((weight, i) => (usable[i] === 0 ? weight === 0 : weight > 0))).toBe(true);
    expect(estimateInverseVariance(new Float64Array(50), ALL.slice(0, 50)).every((w) => w === 0)).toBe(true);
    expect(estimateInverseVariance(flux.slice(0, 5), ALL.slice(0, 5)).every((w) => w === 0)).toBe(true);
  });
});
