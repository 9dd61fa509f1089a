import { describe, expect, it } from 'vitest';
import {
  HYDROGEN_LINES,
  hydrogenOscillatorStrength,
  hydrogenWavelength,
} from '../../../templates/physics/hydrogen-lines.ts';

/** Strength-weighted centroids of Dirac's energies with Lamb shift, vacuum angstrom, and f of Wiese, Smith & Glennon 1966. */
const PUBLISHED = [
  [1, 2, 1215.67005, 0.4162],
  [2, 3, 6564.60806, 0.6407],
  [2, 4, 4862.6829, 0.1193],
  [2, 5, 4341.68368, 0.04467],
  [2, 6, 4102.8922, 0.02209],
  [2, 10, 3798.97574, 0.003851],
  [2, 16, 3704.90641, 0.00087596],
  [3, 8, 9548.58994, 0.016027],
  [3, 14, 8600.75361, 0.0022223],
] as const;

describe('hydrogenWavelength', () => {
  it.each(PUBLISHED)(
    'of %i-%i is within 0.3 km/s (Lyman alpha 0.8) of the fine-structure centroid',
    (n, m, wavelength) => {
      const velocity = (hydrogenWavelength(n, m) / wavelength - 1) * 299792.458;
      // The mean of the fine structure is weighted by statistical weights here, by line strengths there.
      expect(Math.abs(velocity)).toBeLessThan(n === 1 ? 0.8 : 0.3);
    },
  );
});

describe('hydrogenOscillatorStrength', () => {
  it.each(PUBLISHED)('of %i-%i agrees with the published value within 0.2 per cent', (n, m, _, f) => {
    expect(Math.abs(hydrogenOscillatorStrength(n, m) / f - 1)).toBeLessThan(0.002);
  });
});

describe('HYDROGEN_LINES', () => {
  it('holds Lyman alpha, Balmer to level 30 and Paschen to level 27', () => {
    const last = [1, 2, 3].map((lower) =>
      Math.max(...HYDROGEN_LINES.filter((line) => line.lower === lower).map((line) => line.upper)),
    );
    expect(last).toEqual([2, 30, 27]);
  });
});
