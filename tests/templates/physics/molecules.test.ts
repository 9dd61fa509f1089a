import { describe, expect, it } from 'vitest';
import { compose } from '../../../templates/physics/composition.ts';
import { solveGas } from '../../../templates/physics/gas.ts';
import { dissociationConstant } from '../../../templates/physics/molecule-equilibrium.ts';
import { solveChemistry } from '../../../templates/physics/molecules.ts';
import { BUNDLED_TABLES } from './bundled-tables.ts';

const TEMPERATURES = Float64Array.of(2500, 3500, 5000);
const PRESSURES = Float64Array.of(1e4, 1e4, 1e5);
const CARBON = 6;
const OXYGEN = 8;

function chemistry(carbon: number) {
  const composition = compose(BUNDLED_TABLES.elements, 0, 0, carbon);
  const gas = solveGas(TEMPERATURES, PRESSURES, composition, BUNDLED_TABLES);
  return { composition, gas, found: solveChemistry(gas, composition, BUNDLED_TABLES) };
}

describe('solveChemistry', () => {
  it.each([0, 0.6])('conserves carbon and oxygen nuclei with %d dex more carbon', (carbon) => {
    const { composition, gas, found } = chemistry(carbon);
    const at = (molecule: string, i: number): number => found.molecules.get(molecule)![i]!;
    for (let i = 0; i < TEMPERATURES.length; i += 1) {
      const carbonNuclei = composition.perHydrogen.get(CARBON)! * gas.hydrogenNuclei[i]!;
      const boundCarbon = at('CO', i) + at('CN', i) + at('CH', i) + 2 * at('C2', i);
      expect(found.freeShare.get(CARBON)![i]! + boundCarbon / carbonNuclei).toBeCloseTo(1, 3);
      const oxygenNuclei = composition.perHydrogen.get(OXYGEN)! * gas.hydrogenNuclei[i]!;
      const boundOxygen = at('CO', i) + at('OH', i) + at('TiO', i) + at('VO', i) + at('SiO', i);
      expect(found.freeShare.get(OXYGEN)![i]! + boundOxygen / oxygenNuclei).toBeCloseTo(1, 3);
    }
  });

  it('binds carbon in CO at 2500 K in solar gas, and leaves it for C2 where it outnumbers oxygen', () => {
    const solar = chemistry(0);
    const rich = chemistry(0.6);
    expect(solar.found.freeShare.get(CARBON)![0]).toBeLessThan(1e-3);
    const ratio = rich.found.molecules.get('C2')![0]! / solar.found.molecules.get('C2')![0]!;
    expect(ratio).toBeGreaterThan(1e4);
    expect(rich.found.molecules.get('TiO')![0]).toBeLessThan(1e-3 * solar.found.molecules.get('TiO')![0]!);
  });
});

describe('dissociationConstant', () => {
  it('at the nodes is the published pressure constant over kT', () => {
    // Barklem & Collet 2016: log10 pK(CO, 4000 K) = -1.8754 Pa.
    const expected = (10 ** -1.8754 * 10) / (1.380649e-16 * 4000);
    expect(dissociationConstant(BUNDLED_TABLES.equilibrium, 'CO', 4000) / expected).toBeCloseTo(1, 9);
  });

  it('refuses an unknown molecule', () => {
    expect(() => dissociationConstant(BUNDLED_TABLES.equilibrium, 'XY', 4000)).toThrow(RangeError);
  });
});
