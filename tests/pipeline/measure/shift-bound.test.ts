import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { renderColumns } from '../../../pipeline/measure/columns.ts';
import { refitPixels } from '../../../pipeline/measure/refit-pixels.ts';
import { shiftBound, velocityQuality } from '../../reference/shift-bound.ts';

/** Pixels of step 0.05 Å from 5,000 to 5,100 Å. */
const WAVELENGTH = Float64Array.from({ length: 2000 }, (_, i) => 5000 + 0.05 * i);
const LINES = [
  { centre: 5030, depth: 0.6, sigma: 0.3 },
  { centre: 5070.3, depth: 0.3, sigma: 0.5 },
];
const CONTINUUM = 10_000;

function dip(x: number, { centre, depth, sigma }: (typeof LINES)[number]): number {
  return depth * Math.exp(-0.5 * ((x - centre) / sigma) ** 2);
}

const PHOTONS = WAVELENGTH.map((x) => CONTINUUM * (1 - LINES.reduce((sum, line) => sum + dip(x, line), 0)));
const SLOPE = WAVELENGTH.map((x) =>
  LINES.reduce((sum, line) => sum + (CONTINUUM * dip(x, line) * (x - line.centre)) / line.sigma ** 2, 0),
);

describe('the bounds that precision is held to', () => {
  it('are those of a Gaussian line: (sigma/d) √(2 s dx/√π) = 0.0147190 for s 1.2, d 0.5, dx 0.1, sigma 0.02', () => {
    // Closed form of Σ (dT/dx)² for a well-sampled line; arithmetic checked with numpy 1.24.
    const derivative = Float64Array.from({ length: 400 }, (_, i) => {
      const x = (i - 200) * 0.1;
      return ((0.5 * -x) / 1.2 ** 2) * Math.exp(-0.5 * (x / 1.2) ** 2);
    });
    expect(shiftBound(derivative, () => 0.02)).toBeCloseTo(0.01471899453367445, 12);
  });

  it('are those of Bouchy, Pepe & Queloz 2001: Q = 687.24 and 97.950 m/s by photons alone (numpy 1.24)', () => {
    const { quality, velocityBoundMS } = velocityQuality(WAVELENGTH, PHOTONS, SLOPE, 0);
    expect(quality).toBeCloseTo(687.2375836045, 6);
    expect(velocityBoundMS).toBeCloseTo(97.949559602, 6);
  });

  it('are those with 10 counts of detector noise: Q = 681.84 and 98.725 m/s', () => {
    const { quality, velocityBoundMS } = velocityQuality(WAVELENGTH, PHOTONS, SLOPE, 10);
    expect(quality).toBeCloseTo(681.8413541, 5);
    expect(velocityBoundMS).toBeCloseTo(98.724752096, 6);
  });
});

describe('renderColumns()', () => {
  it('keeps the information of a line on pixels finer than the line: the bound grows by less than 2 per cent', () => {
    const grid = { lnStart: Math.log(4990), step: 2e-6, length: 13_000 };
    const flux = Float32Array.from({ length: grid.length }, (_, i) => {
      const x = Math.exp(grid.lnStart + i * grid.step);
      return 1 - LINES.reduce((sum, line) => sum + dip(x, line), 0);
    });
    const component = {
      label: 'two lines',
      role: 'continuum',
      group: '',
      flux,
      first: 0,
      end: grid.length,
    } as const;
    const random = seededRandom(7);
    const level = new Float64Array(WAVELENGTH.length);
    const ones = new Float64Array(WAVELENGTH.length).fill(1);
    const arm = {
      wavelengthVacuumAngstrom: WAVELENGTH,
      flux: ones.map(() => random.normal()),
      inverseVariance: ones,
      level,
    };
    const pixels = refitPixels([arm], 0);
    const h = 1e-7;
    const up = renderColumns([component], grid, h, pixels).values;
    const down = renderColumns([component], grid, -h, pixels).values;
    const perVelocity = Float64Array.from(up, (v, i) => (v - down[i]!) / (2 * h * 299_792_458));
    const exact = SLOPE.map((slope, i) => (slope / CONTINUUM) * (WAVELENGTH[i]! / 299_792_458));
    const ratio = shiftBound(perVelocity, () => 0.01) / shiftBound(exact, () => 0.01);
    expect(ratio).toBeGreaterThan(0.99);
    expect(ratio).toBeLessThan(1.02);
  });
});
