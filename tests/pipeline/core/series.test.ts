import { describe, expect, it } from 'vitest';
import { lowPass } from '../../../pipeline/core/low-pass.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { cumulativeIntegral, edgesFromCentres, rebinDensity } from '../../../pipeline/core/rebin.ts';
import { boxSmooth, gaussianSmooth } from '../../../pipeline/core/smooth.ts';
import { cosineBell } from '../../../pipeline/core/taper.ts';

describe('rebinDensity()', () => {
  it('conserves the integral to 1e-12, finer and coarser', () => {
    const random = seededRandom(31);
    const from = edgesFromCentres(
      Float64Array.from({ length: 500 }, (_, i) => 4000 + 1.3 * i + 1e-4 * i * i),
    );
    const density = Float64Array.from({ length: 500 }, () => random.normal());
    const whole = cumulativeIntegral(density, from)[500]!;
    const scale = cumulativeIntegral(density.map(Math.abs), from)[500]!;
    for (const count of [37, 500, 1700]) {
      const first = from[0]! - 5;
      const width = (from[500]! + 7 - first) / count;
      const to = Float64Array.from({ length: count + 1 }, (_, j) => first + j * width);
      const rebinned = rebinDensity(density, from, to);
      const sum = rebinned.reduce((total, value, j) => total + value * (to[j + 1]! - to[j]!), 0);
      expect(Math.abs(sum - whole) / scale).toBeLessThan(1e-12);
    }
  });

  it('gives the difference of the running integral, interpolated, in every pixel', () => {
    const from = [0, 1, 3, 4];
    const to = [0.5, 2, 3.5];
    // Densities 1, 2, 4: integral 0.5 + 2 = 2.5 over 1.5; 2 + 2 = 4 over 1.5.
    expect([...rebinDensity([1, 2, 4], from, to)]).toEqual([2.5 / 1.5, 4 / 1.5]);
  });

  it('gives 0 beyond the data', () => {
    expect([...rebinDensity([1], [0, 1], [2, 3, 4])]).toEqual([0, 0]);
  });
});

describe('edgesFromCentres()', () => {
  it('puts edges half way and mirrors the outer ones', () => {
    expect([...edgesFromCentres([1, 2, 4])]).toEqual([0.5, 1.5, 3, 5]);
  });

  it('refuses a single centre: its width is not known', () => {
    expect(() => edgesFromCentres([1])).toThrow(RangeError);
  });
});

describe('gaussianSmooth() and boxSmooth()', () => {
  it('keep a constant, whatever the weights', () => {
    const random = seededRandom(32);
    const values = new Float64Array(80).fill(3);
    const weight = Float64Array.from(values, () => random.uniform());
    for (const v of gaussianSmooth(values, 2.5, weight)) expect(v).toBeCloseTo(3, 12);
    for (const v of boxSmooth(values, 9, weight)) expect(v).toBeCloseTo(3, 12);
  });

  it('widen a Gaussian by the square root of the sum of squares', () => {
    const values = Float64Array.from({ length: 101 }, (_, i) => Math.exp(-0.5 * ((i - 50) / 3) ** 2));
    const smooth = gaussianSmooth(values, 4);
    const sum = smooth.reduce((s, v) => s + v, 0);
    const variance = smooth.reduce((s, v, i) => s + v * (i - 50) ** 2, 0) / sum;
    // The kernel is cut at 4 sigma, which takes 0.1 per cent of its variance.
    expect(Math.abs(variance / 25 - 1)).toBeLessThan(0.002);
  });

  it('ignore samples without weight, NaN included', () => {
    const values = Float64Array.from([1, NaN, 1, 1, 100, 1]);
    const weight = Float64Array.from([1, 0, 1, 1, 0, 1]);
    for (const v of gaussianSmooth(values, 1, weight)) expect(v).toBeCloseTo(1, 14);
    for (const v of boxSmooth(values, 3, weight)) expect(v).toBeCloseTo(1, 14);
  });
});

describe('lowPass()', () => {
  it('keeps a long wave and removes a short one', () => {
    const wave = (period: number): Float64Array =>
      Float64Array.from({ length: 1024 }, (_, i) => Math.sin((2 * Math.PI * i) / period));
    const middle = (x: Float64Array): Float64Array => x.subarray(200, 824);
    const long = middle(lowPass(wave(40), 5, 2.5));
    const short = middle(lowPass(wave(2.2), 5, 2.5));
    middle(wave(40)).forEach((v, i) => {
      expect(Math.abs(long[i]! - v)).toBeLessThan(1e-3);
    });
    for (const v of short) expect(Math.abs(v)).toBeLessThan(1e-2);
  });
});

describe('cosineBell()', () => {
  it('rises over the stated part, is 1 between and symmetric', () => {
    const bell = cosineBell(100, 0.1);
    expect(bell[0]!).toBeLessThan(0.01);
    expect(bell[4]! + bell[5]!).toBeCloseTo(1, 12);
    expect(bell[10]).toBe(1);
    expect([...bell].reverse()).toEqual([...bell]);
  });
});
