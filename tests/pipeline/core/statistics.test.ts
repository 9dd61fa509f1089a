import { describe, expect, it } from 'vitest';
import { maskedAutocorrelation } from '../../../pipeline/core/autocorrelation.ts';
import { median, quantile, robustSigma } from '../../../pipeline/core/quantile.ts';
import { seededRandom, xoshiro128StarStar } from '../../../pipeline/core/random.ts';
import { runningMedian } from '../../../pipeline/core/running-median.ts';

describe('quantile()', () => {
  it('gives the values of numpy.quantile', () => {
    // numpy.quantile([3, 1, 4, 1, 5, 9, 2, 6], q), linear.
    const values = [3, 1, 4, 1, 5, 9, 2, 6];
    const expected: [number, number][] = [
      [0, 1],
      [0.1, 1],
      [0.25, 1.75],
      [0.5, 3.5],
      [0.9, 6.9],
      [1, 9],
    ];
    for (const [q, value] of expected) expect(quantile(values, q)).toBeCloseTo(value, 14);
  });

  it('agrees with sorting on 200 random arrays with ties', () => {
    const random = seededRandom(21);
    for (let trial = 0; trial < 200; trial++) {
      const values = Array.from({ length: 1 + random.integer(50) }, () => random.integer(20));
      const sorted = [...values].sort((a, b) => a - b);
      const place = 0.3 * (values.length - 1);
      const low = sorted[Math.floor(place)]!;
      const high = sorted[Math.ceil(place)]!;
      expect(quantile(values, 0.3)).toBeCloseTo(low + (place - Math.floor(place)) * (high - low), 12);
    }
  });

  it('leaves out what is not finite and does not change its input', () => {
    const values = Float64Array.from([NaN, 2, Infinity, 1, 3]);
    expect(median(values)).toBe(2);
    expect([...values]).toEqual([NaN, 2, Infinity, 1, 3]);
  });

  it('gives NaN when there is nothing to rank', () => {
    expect(median([])).toBeNaN();
    expect(median([NaN])).toBeNaN();
    expect(robustSigma([])).toBeNaN();
  });
});

describe('robustSigma()', () => {
  it('is the standard deviation of normal noise, outliers or not', () => {
    const random = seededRandom(22);
    const values = Array.from({ length: 20000 }, () => 5 + 3 * random.normal());
    // Its own spread is 1.17 sigma / √n = 0.8 % here (Rousseeuw & Croux 1993): 3 of those.
    expect(Math.abs(robustSigma(values) / 3 - 1)).toBeLessThan(0.025);
    for (let i = 0; i < 200; i++) values[i] = 1e6;
    // One per cent of outliers moves the median deviation by about one per cent of its rank.
    expect(Math.abs(robustSigma(values) / 3 - 1)).toBeLessThan(0.045);
  });
});

describe('runningMedian()', () => {
  it('equals the median of each window, gaps left out, on random data with ties', () => {
    const random = seededRandom(23);
    const values = Float64Array.from({ length: 300 }, () => random.integer(9));
    values[17] = NaN;
    const usable = Uint8Array.from(values, () => (random.uniform() < 0.8 ? 1 : 0));
    for (const window of [1, 3, 51, 299, 701]) {
      const result = runningMedian(values, window, usable);
      const half = (window - 1) / 2;
      for (let i = 0; i < values.length; i++) {
        const inside: number[] = [];
        for (let j = Math.max(0, i - half); j <= Math.min(299, i + half); j++) {
          if (usable[j] === 1) inside.push(values[j]!);
        }
        expect(result[i]).toEqual(median(inside));
      }
    }
  });

  it('refuses an even window', () => {
    expect(() => runningMedian([1, 2], 2)).toThrow(RangeError);
  });
});

describe('maskedAutocorrelation()', () => {
  it('finds the correlation of a moving average, gaps or not', () => {
    // x_i = e_i + 0.5 e_{i−1}: correlation 0.5 / 1.25 = 0.4 at lag 1, 0 beyond. Spread 1/√n = 0.007.
    const random = seededRandom(24);
    const noise = Float64Array.from({ length: 20001 }, () => random.normal());
    const series = Float64Array.from({ length: 20000 }, (_, i) => noise[i + 1]! + 0.5 * noise[i]!);
    const usable = Uint8Array.from(series, () => (random.uniform() < 0.9 ? 1 : 0));
    usable.forEach((u, i) => {
      if (u === 0) series[i] = NaN;
    });
    const rho = maskedAutocorrelation(series, usable, 3);
    expect(Math.abs(rho[0]! - 0.4)).toBeLessThan(0.025);
    expect(Math.abs(rho[1]!)).toBeLessThan(0.025);
    expect(Math.abs(rho[2]!)).toBeLessThan(0.025);
  });

  it('gives NaN without a usable pair', () => {
    expect([...maskedAutocorrelation([1, 2, 3], [1, 0, 1], 1)]).toEqual([NaN]);
  });
});

describe('seededRandom()', () => {
  it('runs on the generator as published', () => {
    // xoshiro128** 1.1 from state 1, 2, 3, 4: first four outputs by the authors' C code (Blackman & Vigna 2021).
    const next = xoshiro128StarStar([1, 2, 3, 4]);
    expect([next(), next(), next(), next()]).toEqual([11520, 0, 5927040, 70819200]);
  });

  it('repeats for the same seed and differs for the next', () => {
    const stream = (seed: number): number[] => {
      const random = seededRandom(seed);
      return Array.from({ length: 5 }, () => random.uniform());
    };
    expect(stream(7)).toEqual(stream(7));
    expect(stream(7)).not.toEqual(stream(8));
  });

  it('gives uniform and normal deviates with the right moments', () => {
    const random = seededRandom(25);
    const n = 100000;
    const moments = (draw: () => number): number[] => {
      const sums = [0, 0, 0];
      for (let i = 0; i < n; i++) {
        const v = draw();
        sums[0]! += v / n;
        sums[1]! += v ** 2 / n;
        sums[2]! += v ** 4 / n;
      }
      return sums;
    };
    // Four standard errors of each moment: √(var of v^k / n).
    const [mean, square] = moments(() => random.uniform());
    expect(Math.abs(mean! - 1 / 2)).toBeLessThan(4 * Math.sqrt(1 / 12 / n));
    expect(Math.abs(square! - 1 / 3)).toBeLessThan(4 * Math.sqrt(4 / 45 / n));
    const [centre, variance, fourth] = moments(() => random.normal());
    expect(Math.abs(centre!)).toBeLessThan(4 * Math.sqrt(1 / n));
    expect(Math.abs(variance! - 1)).toBeLessThan(4 * Math.sqrt(2 / n));
    expect(Math.abs(fourth! - 3)).toBeLessThan(4 * Math.sqrt(96 / n));
  });

  it('draws whole numbers in range, all of them', () => {
    const random = seededRandom(26);
    const seen = new Set(Array.from({ length: 200 }, () => random.integer(6)));
    expect([...seen].sort((a, b) => a - b)).toEqual([0, 1, 2, 3, 4, 5]);
  });
});
