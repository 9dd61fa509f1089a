import { describe, expect, it } from 'vitest';
import { greySurfaceTerm, temperatureAt } from '../../../templates/physics/temperature-structure.ts';

describe('greySurfaceTerm', () => {
  // Exact Hopf function (Chandrasekhar 1960).
  it.each([
    [0, 0.57735],
    [0.1, 0.627919],
    [0.5, 0.680294],
    [1, 0.698539],
    [3, 0.709808],
  ])('at tau = %d is Hopf function within 2 per cent', (tau, exact) => {
    expect(Math.abs(greySurfaceTerm(tau) / exact - 1)).toBeLessThan(0.02);
  });
});

describe('temperatureAt', () => {
  it('tends to the diffusion law T^4 = 3/4 Teff^4 tau deep inside, at every effective temperature', () => {
    for (const effective of [4000, 5777, 7600, 15000]) {
      const ratio = temperatureAt(effective, 100) / (0.75 * effective ** 4 * 100) ** 0.25;
      expect(ratio).toBeGreaterThan(1);
      expect(ratio).toBeLessThan(1.005);
    }
  });

  // Line-blanketed atmospheres (Kurucz 1979, ApJS 40, 1) have surfaces near 0.7 Teff; grey ones 0.81.
  it('cools the surface of hot stars to about 0.68 Teff', () => {
    expect(temperatureAt(15000, 1e-5) / 15000).toBeCloseTo(0.68, 1);
  });
});
