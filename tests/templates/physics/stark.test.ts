import { describe, expect, it } from 'vitest';
import {
  normalField,
  smoothedArea,
  starkReach,
  starkScale,
  starkShape,
} from '../../../templates/physics/stark.ts';

describe('starkShape', () => {
  it('has area 1 on both sides', () => {
    expect(smoothedArea(0)).toBeCloseTo(1, 3);
  });

  it('falls as beta^-2.5 in the wing with twice the coefficient of Holtsmark, 3', () => {
    expect(starkShape(1000) * 1000 ** 2.5).toBeCloseTo(3, 2);
  });

  // Stehle & Hutcheon 1999 (A&AS 140, 93), full width at half maximum in angstrom at 10,000 K and 1e16 electrons,
  // where Doppler broadening is small. The one formula for all lines is good to 30 per cent there; H alpha with
  // its strong unshifted component is not described (2.05 A).
  it.each([
    ['H beta', 2, 4, 9.3018],
    ['H gamma', 2, 5, 11.7148],
    ['H delta', 2, 6, 20.0798],
    ['H 8', 2, 8, 38.412],
  ])('gives %s the published width within 30 per cent', (_, lower, upper, published) => {
    const scale = starkScale(lower, upper) * normalField(1e16);
    let half = 0;
    while (starkShape(half) > 0.5 * starkShape(0)) {
      half += 0.001;
    }
    expect(Math.abs((2 * half * scale) / published - 1)).toBeLessThan(0.3);
  });

  // Same source, profile per angstrom at 1e14 electrons: the wings decide the equivalent width of a star's line.
  it.each([
    ['H beta', 2, 4, 10, 210.7, 1.743],
    ['H gamma', 2, 5, 10, 147.9, 1.85],
    ['H delta', 2, 6, 10, 107.6, 1.931],
  ])('gives %s its wing within 20 per cent', (_, lower, upper, shift, beta, overIons) => {
    // Tabulated value = overIons times the wing of ions alone, 1.5 beta^-2.5 / scale, at that shift.
    const scale = starkScale(lower, upper) * normalField(1e14);
    expect(shift / scale / beta).toBeCloseTo(1, 1);
    expect(starkShape(beta) / (overIons * 1.5 * beta ** -2.5)).toBeGreaterThan(0.8);
    expect(starkShape(beta) / (overIons * 1.5 * beta ** -2.5)).toBeLessThan(1.2);
  });
});

describe('starkReach', () => {
  it('is where the wing falls to the floor', () => {
    const reach = starkReach(5, 0.2, 1e-6);
    expect((5 * starkShape(reach / 0.2)) / 0.2 / 1e-6).toBeCloseTo(1, 1);
  });
});

describe('smoothedArea', () => {
  it('loses area as the smoothing grows', () => {
    expect(smoothedArea(10)).toBeLessThan(smoothedArea(1));
    expect(smoothedArea(10)).toBeGreaterThan(0);
  });
});
