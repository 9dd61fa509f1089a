import { describe, expect, it } from 'vitest';
import {
  hminusBoundFree,
  hminusCrossSection,
  hminusFreeFree,
  hminusFreeFreeSeries,
} from '../../../templates/physics/hminus.ts';

describe('hminusFreeFree', () => {
  // Bell & Berrington 1987 (J. Phys. B 20, 801), table 1, in 1e-26 cm^4 dyn^-1 at theta = 0.6, 1.0, 1.6.
  it.each([
    [1823, 0.0222, 0.0402, 0.0695],
    [2278, 0.028, 0.0499, 0.0851],
    [3038, 0.0447, 0.0789, 0.132],
    [5063, 0.117, 0.195, 0.311],
    [6510, 0.188, 0.309, 0.482],
    [9113, 0.354, 0.576, 0.874],
    [15189, 0.94, 1.52, 2.26],
  ])('at %i A agrees with Bell & Berrington 1987 within 1.6 per cent', (wavelength, ...published) => {
    const series = hminusFreeFreeSeries(wavelength);
    for (const [i, theta] of [0.6, 1, 1.6].entries()) {
      const found = hminusFreeFree(series, 5040 / theta) / 1e-26;
      expect(Math.abs(found / published[i]! - 1)).toBeLessThan(0.016);
    }
  });
});

describe('hminusCrossSection', () => {
  // The independent polynomial of Gray 2005, eq. 8.12, agrees with John 1988 within 0.6 per cent.
  it.each([
    [4000, 23.087],
    [5000, 29.247],
    [8500, 39.935],
    [10000, 37.863],
    [15000, 7.409],
  ])('at %i A agrees with the polynomial of Gray 2005 within 0.6 per cent', (wavelength, published) => {
    expect(Math.abs(hminusCrossSection(wavelength) / (published * 1e-18) - 1)).toBeLessThan(0.006);
  });

  it('ends at the detachment threshold of 1.6419 micrometre', () => {
    expect(hminusCrossSection(16418)).toBeGreaterThan(0);
    expect(hminusCrossSection(16420)).toBe(0);
  });
});

describe('hminusBoundFree', () => {
  it('at 5000 A and 5777 K is 3.91e-26 cm^4/dyn (Gray 2005: 3.906e-26)', () => {
    expect(hminusBoundFree(5000, 5777) / 3.906e-26).toBeCloseTo(1, 2);
  });
});
