import { describe, expect, it } from 'vitest';
import { SECOND_RADIATION } from '../../../templates/physics/constants.ts';
import { emergentFlux } from '../../../templates/physics/formal-solution.ts';

const GRID = { lnStart: Math.log(5000), step: 0.01, length: 3 };
const DEPTHS = 70;
const TAU = Float64Array.from({ length: DEPTHS }, (_, i) => 10 ** (-5 + (7 * i) / (DEPTHS - 1)));
const ONE = new Float64Array(DEPTHS).fill(1);

/** pi B of Planck's law per angstrom. */
function planckFlux(wavelength: number, temperature: number): number {
  const cm = wavelength * 1e-8;
  return (Math.PI * 1.19104297e-5) / cm ** 5 / (Math.exp(SECOND_RADIATION / (cm * temperature)) - 1) / 1e8;
}

const rowsOf = (opacity: number): Float32Array[] =>
  Array.from({ length: DEPTHS }, () => new Float32Array(GRID.length).fill(opacity));

describe('emergentFlux', () => {
  it('of an isothermal atmosphere is pi B within 0.1 per cent, whatever the opacity', () => {
    const temperature = new Float64Array(DEPTHS).fill(6000);
    for (const opacity of [1, 1e-1, 1e3]) {
      const flux = emergentFlux({ tau: TAU, meanOpacity: ONE, temperature }, GRID, rowsOf(opacity));
      expect(flux[0]! / planckFlux(5000, 6000)).toBeCloseTo(1, 3);
    }
  });

  it('of a source function rising linearly with depth is that of tau = 2/3 (Eddington 1926, Barbier 1943)', () => {
    // Temperatures chosen so that B(5000 A) = B0 (1 + 1.5 tau).
    const b0 = 1 / (Math.exp(SECOND_RADIATION / (5e-5 * 5000)) - 1);
    const temperature = TAU.map((tau) => SECOND_RADIATION / 5e-5 / Math.log(1 + 1 / (b0 * (1 + 1.5 * tau))));
    const flux = emergentFlux({ tau: TAU, meanOpacity: ONE, temperature }, GRID, rowsOf(1));
    // Three-point quadrature of the angles is exact to 0.3 per cent for this source.
    expect(Math.abs(flux[0]! / (2 * planckFlux(5000, 5000)) - 1)).toBeLessThan(0.005);
  });
});
