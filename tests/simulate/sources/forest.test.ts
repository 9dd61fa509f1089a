import { expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { forestTransmission } from '../../../simulate/sources/forest.ts';

const GRID = { lnStart: Math.log(1000), step: 1.15e-4, length: 2600 };
const pixelOf = (wavelength: number): number => Math.round((Math.log(wavelength) - GRID.lnStart) / GRID.step);

it('the mean depth over sight lines is 0.0018 (1+z)^3.92 (Faucher-Giguère et al. 2008)', () => {
  const redshift = 3;
  const logs: number[] = [];
  for (let seed = 0; seed < 100; seed++) {
    const through = forestTransmission(seededRandom(seed), GRID, redshift);
    // Pixels thirty steps, 1,000 km/s, apart: clumps of 150 km/s make them independent.
    for (let i = pixelOf(1050); i < pixelOf(1180); i += 30) {
      const absorber = (Math.exp(GRID.lnStart + i * GRID.step) / 1215.67) * (1 + redshift);
      logs.push(Math.log(-Math.log(through[i]!) / (0.0018 * absorber ** 3.92)));
    }
  }
  const n = logs.length;
  const mean = logs.reduce((sum, value) => sum + value, 0) / n;
  const variance = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1);
  // The mean of a log-normal from its logarithms, exp(m + v/2): the plain mean of so skewed a quantity settles
  // slowly. Its relative error is sqrt(v/n + v²/2n), 3 per cent here; three times that is allowed.
  const error = Math.sqrt(variance / n + variance ** 2 / (2 * n));
  expect(Math.abs(mean + variance / 2)).toBeLessThan(3 * error);
});

it('nothing is absorbed redward of Lyman α', () => {
  const through = forestTransmission(seededRandom(1), GRID, 2.5);
  expect(Math.min(...through.subarray(pixelOf(1216.5)))).toBe(1);
});

it('no two sight lines are alike', () => {
  const at = (seed: number): number => forestTransmission(seededRandom(seed), GRID, 3)[pixelOf(1100)]!;
  expect(at(1)).not.toBeCloseTo(at(2), 3);
});
