import { ATOMIC_MASS_UNIT, BOLTZMANN } from './constants.ts';
import type { Composition } from './composition.ts';
import type { Gas, GasTables } from './gas.ts';
import type { Species } from './line-list.ts';
import { molecularPartition } from './molecular-states.ts';
import type { MolecularState } from './molecular-states.ts';
import { solveChemistry } from './molecules.ts';
import type { Chemistry } from './molecules.ts';
import { partitionFunction } from './partition-functions.ts';
import { ionShares } from './saha.ts';

/** Absorbers of one species per depth. */
export interface Absorbers {
  /** Number density over partition function, cm^-3; all zeros when the species is absent. */
  readonly perWeight: Float64Array;
  /** Doppler velocity sqrt(2kT/m + xi^2), cm/s. */
  readonly doppler: Float64Array;
}

/** Tables of the absorbers. */
export interface AbsorberTables extends GasTables {
  readonly molecularStates: readonly MolecularState[];
}

/** An atmosphere whose coolest layer is hotter has no molecules worth computing. */
const NO_MOLECULES_ABOVE_K = 7000;

/** Molecular weights in u of molecules that have bands. */
const MOLECULAR_WEIGHTS: ReadonlyMap<string, number> = new Map([
  ['TiO', 63.87],
  ['VO', 66.94],
  ['C2', 24.02],
  ['CaH', 41.09],
  ['CH', 13.02],
  ['CN', 26.02],
  ['MgH', 25.31],
]);

function dopplerVelocity(gas: Gas, weight: number, microturbulence: number): Float64Array {
  return gas.temperature.map((t) =>
    Math.sqrt((2 * BOLTZMANN * t) / (weight * ATOMIC_MASS_UNIT) + microturbulence ** 2),
  );
}

function ionAbsorbers(
  species: Species,
  gas: Gas,
  composition: Composition,
  tables: AbsorberTables,
  chemistry: Chemistry | undefined,
): Float64Array {
  const element = tables.elements.get(species.number)!;
  const abundance = composition.perHydrogen.get(species.number) ?? 0;
  const free = chemistry?.freeShare.get(species.number);
  return gas.temperature.map((t, depth) => {
    const partition = partitionFunction(tables.partitions, element.symbol, species.ion, t);
    if (partition === undefined) {
      return 0;
    }
    const share = ionShares(tables.partitions, element, t, gas.electrons[depth]!)[species.ion]!;
    return (abundance * gas.hydrogenNuclei[depth]! * (free?.[depth] ?? 1) * share) / partition;
  });
}

/**
 * Absorbers of every species of a line list. Chemistry is solved only in cool atmospheres; species without a
 * partition function absorb nothing.
 * @param microturbulence cm/s.
 */
export function lineAbsorbers(
  species: readonly Species[],
  gas: Gas,
  composition: Composition,
  tables: AbsorberTables,
  microturbulence: number,
): Absorbers[] {
  const isCool = gas.temperature.reduce((least, t) => Math.min(least, t), Infinity) < NO_MOLECULES_ABOVE_K;
  const chemistry = isCool ? solveChemistry(gas, composition, tables) : undefined;
  return species.map((one): Absorbers => {
    if (one.kind === 'ion') {
      const weight = tables.elements.get(one.number)!.weight;
      return {
        perWeight: ionAbsorbers(one, gas, composition, tables, chemistry),
        doppler: dopplerVelocity(gas, weight, microturbulence),
      };
    }
    const density = chemistry?.molecules.get(one.molecule);
    const weight = MOLECULAR_WEIGHTS.get(one.molecule);
    if (weight === undefined) {
      throw new RangeError(`molecule must have a weight, got ${one.molecule}`);
    }
    return {
      perWeight: gas.temperature.map((t, depth) =>
        density ? density[depth]! / molecularPartition(tables.molecularStates, one.molecule, t) : 0,
      ),
      doppler: dopplerVelocity(gas, weight, microturbulence),
    };
  });
}
