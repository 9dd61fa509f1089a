import { describe, expect, it } from 'vitest';
import { BOLTZMANN } from '../../../templates/physics/constants.ts';
import { partitionFunction } from '../../../templates/physics/partition-functions.ts';
import { ionisationFactor, ionShares } from '../../../templates/physics/saha.ts';
import { BUNDLED_TABLES } from './bundled-tables.ts';

const { elements, partitions } = BUNDLED_TABLES;
const HYDROGEN = elements.get(1)!;
const SODIUM = elements.get(11)!;
const MAGNESIUM = elements.get(12)!;
const CALCIUM = elements.get(20)!;
const IRON = elements.get(26)!;

/** Electron density of an electron pressure in dyn cm^-2. */
const density = (pressure: number, t: number): number => pressure / (BOLTZMANN * t);

describe('ionisationFactor', () => {
  // Worked with the logarithmic form of Saha's equation (Gray 2005) and the partition functions of the same
  // tables by an independent script; 1 per cent is the difference of the published partition functions.
  it.each([
    ['H', HYDROGEN, 0, 5777, 20, 5.79569e-5],
    ['H', HYDROGEN, 0, 10000, 100, 4.67325],
    ['Na', SODIUM, 0, 5777, 20, 1273.52],
    ['Mg', MAGNESIUM, 0, 5000, 5, 9.1043],
    ['Ca', CALCIUM, 0, 5777, 20, 676.23],
    ['Ca', CALCIUM, 1, 5777, 20, 1.58383e-3],
    ['Fe', IRON, 0, 5777, 20, 16.3118],
  ])('gives the published ratio of %s stage %#', (_, element, stage, t, pressure, ratio) => {
    const found = ionisationFactor(partitions, element, stage, t) / density(pressure, t);
    expect(found / ratio).toBeGreaterThan(0.99);
    expect(found / ratio).toBeLessThan(1.01);
  });

  it('is 0 where an element has no further stage', () => {
    expect(ionisationFactor(partitions, HYDROGEN, 1, 8000)).toBe(0);
  });
});

describe('ionShares', () => {
  it('gives the published shares of calcium at 10,000 K and 1000 dyn/cm2, and they sum to 1', () => {
    const shares = ionShares(partitions, CALCIUM, 10000, density(1000, 10000));
    expect(shares[0] / 9.81e-5).toBeCloseTo(1, 1);
    expect(shares[1]).toBeCloseTo(0.3393, 2);
    expect(shares[2]).toBeCloseTo(0.6606, 2);
    expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
  });
});

describe('partitionFunction', () => {
  // Irwin 1981 (ApJS 45, 621), an independent compilation, at 5040 K; both agree to 2 per cent below 6000 K.
  it.each([
    ['Fe', 0, 27.94],
    ['Fe', 1, 42.99],
    ['Ca', 0, 1.183],
    ['Ca', 1, 2.207],
    ['Ti', 1, 55.68],
    ['Cr', 0, 10.52],
    ['Ni', 0, 30.92],
    ['Si', 0, 9.459],
  ])('of %s stage %i agrees with Irwin 1981 within 2 per cent', (symbol, stage, published) => {
    const found = partitionFunction(partitions, symbol, stage, 5040)!;
    expect(Math.abs(found / published - 1)).toBeLessThan(0.02);
  });

  it('is absent for a species that is not in the table', () => {
    expect(partitionFunction(partitions, 'Xx', 0, 5000)).toBeUndefined();
  });
});
