import { describe, expect, it } from 'vitest';
import { dawson, voigt } from '../../../templates/physics/voigt.ts';

describe('voigt', () => {
  // Real part of the Faddeeva function, scipy.special.wofz 1.10.1.
  it.each([
    [0.001, 0, 9.9887262008e-1],
    [0.01, 0, 9.8881546105e-1],
    [0.01, 1, 3.687024174e-1],
    [0.01, 3, 9.0883070674e-4],
    [0.01, 5, 2.4080339195e-4],
    [0.01, 10, 5.7287116225e-5],
    [0.1, 0, 8.9645697997e-1],
    [0.1, 1, 3.7317014831e-1],
    [0.1, 3, 7.9426809988e-3],
    [0.1, 20, 1.4157608792e-4],
    [0.5, 0, 6.1569034419e-1],
    [0.5, 2, 1.0335882374e-1],
    [1, 0, 4.2758357616e-1],
    [1, 1, 3.0474420526e-1],
  ])('H(%d, %d) is within 1e-3 of the exact value relative to it', (a, u, exact) => {
    expect(Math.abs(voigt(a, u) / exact - 1)).toBeLessThan(1e-3);
    expect(voigt(a, -u)).toBe(voigt(a, u));
  });

  it('keeps the area sqrt(pi) for any damping', () => {
    for (const a of [0.001, 0.05, 0.099, 0.11, 0.7, 3]) {
      // Trapezoid to u = 4000; the missing Lorentz tails hold 2 a / (sqrt(pi) 4000).
      let area = (2 * a) / (Math.sqrt(Math.PI) * 4000);
      const step = 0.02;
      for (let u = -4000; u <= 4000; u += step) {
        area += voigt(a, u) * step;
      }
      expect(Math.abs(area / Math.sqrt(Math.PI) - 1)).toBeLessThan(1e-3);
    }
  });

  it('joins its pieces: jumps below 0.3 per cent at a = 0.1 and 0.4 per cent at u = 6', () => {
    for (const u of [0, 0.5, 1, 2, 3, 5]) {
      expect(Math.abs(voigt(0.0999999, u) / voigt(0.1000001, u) - 1)).toBeLessThan(3e-3);
    }
    // The wing formula leaves out the next term of the asymptotic series, 15 / (4 u^4) = 0.3 per cent.
    for (const a of [0.001, 0.05, 0.5, 2]) {
      expect(Math.abs(voigt(a, 5.999999) / voigt(a, 6.000001) - 1)).toBeLessThan(4e-3);
    }
  });
});

describe('dawson', () => {
  // Abramowitz & Stegun 1964, table 7.5: F(0.5), F(1), F(2).
  it.each([
    [0.5, 0.4244363835],
    [1, 0.5380795069],
    [2, 0.3013403889],
  ])('F(%d) is that of Abramowitz & Stegun within 1e-7', (u, published) => {
    expect(Math.abs(dawson(u) - published)).toBeLessThan(1e-7);
  });
});
