import { describe, expect, it } from 'vitest';
import { hydrostaticPressure } from '../../../templates/physics/hydrostatic.ts';

const TAU = Float64Array.from({ length: 60 }, (_, i) => 10 ** (-4 + 0.1 * i));
const LOG_PRESSURES = Float64Array.from({ length: 29 }, (_, i) => -4 + 0.5 * i);

/** Opacity c P^n at every depth. */
const powerLaw = (c: number, n: number): Float64Array[] =>
  Array.from(TAU, () => LOG_PRESSURES.map((log) => Math.log(c) + n * log * Math.LN10));

describe('hydrostaticPressure', () => {
  // Exact: P = g tau / kappa for constant kappa; ((n+1) g tau / c)^(1/(n+1)) for kappa = c P^n.
  it.each([
    [0.3, 0],
    [1e-4, 0.7],
  ])('integrates kappa = %d P^%d to the closed form', (c, n) => {
    const pressure = hydrostaticPressure(TAU, 2.7e4, LOG_PRESSURES, powerLaw(c, n));
    for (let depth = 30; depth < TAU.length; depth += 1) {
      const exact = (((n + 1) * 2.7e4 * TAU[depth]!) / c) ** (1 / (n + 1));
      // Trapezoid in ln tau with steps of 0.23: error step^2 / 12 = 0.4 per cent; the start is forgotten by then.
      expect(Math.abs(pressure[depth]! / exact - 1)).toBeLessThan(0.01);
    }
  });
});
