import { describe, expect, it } from 'vitest';
import { compose } from '../../../templates/physics/composition.ts';
import { BOLTZMANN } from '../../../templates/physics/constants.ts';
import { solveGas } from '../../../templates/physics/gas.ts';
import { ionShares } from '../../../templates/physics/saha.ts';
import { BUNDLED_TABLES } from './bundled-tables.ts';

const SOLAR = compose(BUNDLED_TABLES.elements, 0, 0, 0);
const TEMPERATURES = [2500, 4000, 5777, 9000, 20000];
const PRESSURES = [1e5, 1e4, 1e5, 1e3, 1e3];
const gas = solveGas(Float64Array.from(TEMPERATURES), Float64Array.from(PRESSURES), SOLAR, BUNDLED_TABLES);

describe('solveGas', () => {
  it('conserves particles: atoms, ions, electrons and H2 together exert the pressure', () => {
    for (const [i, t] of TEMPERATURES.entries()) {
      const hydrogen = gas.neutralHydrogen[i]! + gas.protons[i]! + gas.molecularHydrogen[i]!;
      const heavier = SOLAR.heavierPerHydrogen * gas.hydrogenNuclei[i]!;
      const total = hydrogen + heavier + gas.electrons[i]!;
      // The electron density is bisected to 1e-12 of all particles.
      expect(total / (PRESSURES[i]! / (BOLTZMANN * t))).toBeCloseTo(1, 9);
    }
  });

  it('conserves charge: electrons equal the charges of all ions, from all elements, within 1 per cent', () => {
    for (const [i, t] of TEMPERATURES.entries()) {
      let charge = gas.protons[i]!;
      for (const [number, abundance] of SOLAR.perHydrogen) {
        if (number > 1) {
          const element = BUNDLED_TABLES.elements.get(number)!;
          const [, first, second] = ionShares(BUNDLED_TABLES.partitions, element, t, gas.electrons[i]!);
          charge += abundance * gas.hydrogenNuclei[i]! * (first + 2 * second);
        }
      }
      expect(Math.abs(gas.electrons[i]! / charge - 1)).toBeLessThan(0.01);
    }
  });

  it('is molecular at 2500 K, atomic at the solar surface and ionised at 20,000 K', () => {
    expect(gas.molecularHydrogen[0]).toBeGreaterThan(5 * gas.neutralHydrogen[0]!);
    expect(gas.neutralHydrogen[2]! / gas.hydrogenNuclei[2]!).toBeGreaterThan(0.99);
    expect(gas.protons[4]! / gas.hydrogenNuclei[4]!).toBeGreaterThan(0.99);
  });

  it('holds 1.4 hydrogen masses per hydrogen atom, the mean weight of solar gas', () => {
    expect(SOLAR.massPerHydrogen / 1.6735e-24).toBeGreaterThan(1.35);
    expect(SOLAR.massPerHydrogen / 1.6735e-24).toBeLessThan(1.42);
  });
});
