import { describe, expect, it } from 'vitest';
import { correlateReal, powerOfTwoFor } from '../../../pipeline/core/correlate.ts';
import { fftOfSize } from '../../../pipeline/core/fft.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { separatePair } from '../../../pipeline/core/real-pair.ts';
import { bitReverse, discreteFourierTransform } from '../../reference/discrete-fourier-transform.ts';

const normals = (seed: number, n: number): Float64Array => {
  const random = seededRandom(seed);
  return Float64Array.from({ length: n }, () => random.normal());
};

describe('fftOfSize()', () => {
  // Sizes reach every path: radix-2 only, radix-4 only, and both with several passes.
  it.each([2, 4, 8, 16, 128, 512, 1024])(
    'gives the sums of the definition, bit-reversed, for size %i',
    (n) => {
      const re = normals(1, n);
      const im = normals(2, n);
      const expected = discreteFourierTransform(re, im);
      fftOfSize(n).forward(re, im);
      // Rounding of n additions of numbers of order 1, random in sign: below 1e-15 n for all n here.
      for (let k = 0; k < n; k++) {
        const at = bitReverse(k, n);
        expect(Math.abs(re[at]! - expected.re[k]!)).toBeLessThan(1e-14 * n);
        expect(Math.abs(im[at]! - expected.im[k]!)).toBeLessThan(1e-14 * n);
      }
    },
  );

  it.each([2, 8, 64, 8192, 16384])('comes back to the input, times the size, for size %i', (n) => {
    const re = normals(3, n);
    const im = normals(4, n);
    const before = re.slice();
    const fft = fftOfSize(n);
    fft.forward(re, im);
    fft.inverse(re, im);
    const worst = Math.max(...re.map((v, i) => Math.abs(v / n - before[i]!)));
    expect(worst).toBeLessThan(1e-14);
  });

  it.each([0, 1, 3, 12, 2.5, NaN, 2 ** 25])('refuses size %d', (n) => {
    expect(() => fftOfSize(n)).toThrow(RangeError);
  });
});

describe('separatePair()', () => {
  it('gives the transforms of two real arrays from one transform', () => {
    const n = 64;
    const a = normals(5, n);
    const b = normals(6, n);
    const re = a.slice();
    const im = b.slice();
    fftOfSize(n).forward(re, im);
    const [aRe, aIm, bRe, bIm] = Array.from({ length: 4 }, () => new Float64Array(n));
    separatePair(re, im, aRe!, aIm!, bRe!, bIm!);
    const zeros = new Float64Array(n);
    const ofA = discreteFourierTransform(a, zeros);
    const ofB = discreteFourierTransform(b, zeros);
    for (let k = 0; k < n; k++) {
      const at = bitReverse(k, n);
      expect(aRe![at]!).toBeCloseTo(ofA.re[k]!, 11);
      expect(aIm![at]!).toBeCloseTo(ofA.im[k]!, 11);
      expect(bRe![at]!).toBeCloseTo(ofB.re[k]!, 11);
      expect(bIm![at]!).toBeCloseTo(ofB.im[k]!, 11);
    }
  });
});

describe('correlateReal()', () => {
  it.each([
    [1, 1],
    [5, 3],
    [3, 40],
    [100, 77],
  ])('equals the direct sum at every lag for lengths %i and %i', (n, m) => {
    const a = normals(7, n);
    const b = normals(8, m);
    const c = correlateReal(a, b);
    expect(c.length).toBe(n + m - 1);
    for (let lag = -(n - 1); lag < m; lag++) {
      let direct = 0;
      for (let i = 0; i < n; i++) direct += a[i]! * (b[i + lag] ?? 0);
      expect(c[lag + n - 1]!).toBeCloseTo(direct, 11);
    }
  });
});

describe('powerOfTwoFor()', () => {
  it('rounds up, and gives at least 2', () => {
    expect([0, 1, 2, 3, 4, 5, 8192, 8193].map(powerOfTwoFor)).toEqual([2, 2, 2, 4, 4, 8, 8192, 16384]);
  });
});
