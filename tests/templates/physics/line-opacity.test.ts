import { describe, expect, it } from 'vitest';
import { compose } from '../../../templates/physics/composition.ts';
import { solveGas } from '../../../templates/physics/gas.ts';
import { toLineList } from '../../../templates/physics/line-list.ts';
import type { Line } from '../../../templates/physics/line-list.ts';
import { addLines } from '../../../templates/physics/line-opacity.ts';
import { voigt } from '../../../templates/physics/voigt.ts';
import { BUNDLED_TABLES } from './bundled-tables.ts';

const GRID = { lnStart: Math.log(5000), step: 2 / 299792.458, length: 6000 };
const TEMPERATURE = 5000;
const gas = solveGas(
  Float64Array.of(TEMPERATURE),
  Float64Array.of(1e5),
  compose(BUNDLED_TABLES.elements, 0, 0, 0),
  BUNDLED_TABLES,
);
const ABSORBERS = { perWeight: Float64Array.of(1e8), doppler: Float64Array.of(2e5) };
const CONTINUUM = 1e-7;

/** Lines with Doppler cores and with wide wings, some centred outside the grid. */
const LINES: Line[] = [4999.5, 5050.3, 5101.7, 5150.01, 5151.2, 5205].map((wavelength, i) => ({
  species: { kind: 'ion', number: 26, ion: 0, molecule: '' },
  wavelength,
  energyEv: 0.5 * i,
  gf: 10 ** (i - 3),
  radiative: 1e8,
  vanDerWaals: i % 2 === 0 ? 1e-8 : 3e-6,
  stark: 0,
}));

/** The formula of the doc comment, every line at every pixel: no cut-off, no tables. */
function slowOpacity(pixel: number): number {
  const wavelength = Math.exp(GRID.lnStart + pixel * GRID.step);
  let sum = CONTINUUM;
  for (const line of LINES) {
    const cm = line.wavelength * 1e-8;
    const width = line.radiative + line.vanDerWaals * gas.neutralHydrogen[0]! * (TEMPERATURE / 1e4) ** 0.3;
    const u = (Math.log(wavelength / line.wavelength) * 2.99792458e10) / 2e5;
    sum +=
      ((0.0265400885 * line.gf * 1e8 * Math.exp((-line.energyEv * 11604.518) / TEMPERATURE) * cm) /
        (Math.sqrt(Math.PI) * 2e5)) *
      (1 - Math.exp(-1.438776877 / (cm * TEMPERATURE))) *
      voigt((width * cm) / (4 * Math.PI * 2e5), u);
  }
  return sum;
}

describe('addLines', () => {
  it('agrees with the sum over all lines at every pixel but for the wings it cuts off', () => {
    const row = new Float32Array(GRID.length).fill(CONTINUUM);
    const samples = new Float32Array(Math.ceil(GRID.length / 64)).fill(CONTINUUM);
    addLines(toLineList(LINES), [ABSORBERS], gas, GRID, { depths: [row], continuum: [samples] });
    let greatest = 0;
    for (let pixel = 0; pixel < GRID.length; pixel += 1) {
      const exact = slowOpacity(pixel);
      // Each of the six lines may lack 0.2 per cent of the continuum.
      expect(Math.abs(row[pixel]! - exact)).toBeLessThan(6 * 2e-3 * CONTINUUM + 1e-4 * exact);
      greatest = Math.max(greatest, exact / CONTINUUM);
    }
    // The lines are neither all lost in the continuum nor all saturated: the comparison reaches cores and wings.
    expect(greatest).toBeGreaterThan(100);
  });
});
