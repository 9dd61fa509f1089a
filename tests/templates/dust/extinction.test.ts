import { describe, expect, it } from 'vitest';
import { galacticExtinction } from '../../../templates/dust/galactic.ts';
import { quasarReddening } from '../../../templates/dust/quasar.ts';
import { starburstAttenuation } from '../../../templates/dust/starburst.ts';
import { behindDust } from '../../../templates/dust/transmission.ts';

/** A(λ)/A(V) printed by the extinction 0.4.6 package: O'Donnell at R 3.1 and 5, Calzetti at 4.05. */
const PUBLISHED: readonly (readonly [angstrom: number, r31: number, r5: number, starburst: number])[] = [
  [1200, 3.58713, 1.741533, 2.992438],
  [1500, 2.663879, 1.496035, 2.551582],
  [2175, 3.185101, 1.974286, 2.093492],
  [2500, 2.315317, 1.570905, 1.929665],
  [3000, 1.818157, 1.374176, 1.709991],
  [3500, 1.604078, 1.340093, 1.522386],
  [4400, 1.322219, 1.200082, 1.249454],
  [5494.5, 1.000001, 1.000001, 1.000552],
  [6562.8, 0.812459, 0.849247, 0.821216],
  [8000, 0.607935, 0.669611, 0.634305],
  [10000, 0.404, 0.4686, 0.463604],
  [22000, 0.113522, 0.131675, 0.091165],
];

describe('extinction curves', () => {
  it.each(PUBLISHED)(
    'at %f Å equal an independent implementation in all printed digits',
    (angstrom, r31, r5, sb) => {
      expect(galacticExtinction(angstrom)).toBeCloseTo(r31, 6);
      expect(galacticExtinction(angstrom, 5)).toBeCloseTo(r5, 6);
      expect(starburstAttenuation(angstrom)).toBeCloseTo(sb, 6);
    },
  );

  it('galacticExtinction() has no jump where its pieces meet', () => {
    for (const inverseMicrons of [1.1, 3.3, 5.9, 8]) {
      const blue = galacticExtinction(1e4 / (inverseMicrons + 1e-9));
      const red = galacticExtinction(1e4 / (inverseMicrons - 1e-9));
      // CCM89 and O'Donnell were fitted piecewise: the published pieces miss each other by up to 0.02.
      expect(Math.abs(blue - red)).toBeLessThan(0.02);
    }
  });

  it('starburstAttenuation() is held at its 1200 Å value below the range it was measured in', () => {
    expect(starburstAttenuation(900)).toBe(starburstAttenuation(1200));
  });

  it('quasarReddening() makes E(B−V) the difference of B and V within 10 per cent', () => {
    // By definition A(B) − A(V) = E(B−V); the power law was fitted in the ultraviolet, hence the margin.
    expect(quasarReddening(4400) - quasarReddening(5500)).toBeGreaterThan(0.75);
    expect(quasarReddening(4400) - quasarReddening(5500)).toBeLessThan(1.1);
  });

  it('behindDust() dims by 10^(−0.4 A)', () => {
    const seen = behindDust(Float32Array.of(1, 1), Float64Array.of(5000, 6000), () => 2, 0.5);
    expect(seen[0]).toBeCloseTo(0.398107, 6);
    const clear = Float32Array.of(3, 4);
    expect(behindDust(clear, Float64Array.of(1, 2), () => 2, 0)).toBe(clear);
  });
});
