import { HYDROGEN_IONISATION_EV, KELVIN_PER_EV } from './constants.ts';
import type { Composition } from './composition.ts';
import { numberColumn, parseCsv } from './csv-columns.ts';
import type { Gas, GasTables } from './gas.ts';
import { boundShare } from './occupation.ts';
import { partitionFunction } from './partition-functions.ts';
import { ionShares } from './saha.ts';

/** Absorption from one bound level into the continuum, at every point of a gas. */
export interface Edge {
  readonly edgeAngstrom: number;
  /** cm^2 at the edge. */
  readonly threshold: number;
  /** sigma = threshold (wavelength / edge)^power at and below the edge. */
  readonly power: number;
  /** Absorbers per cm^3, one value per point. */
  readonly population: Float64Array;
}

/** One row of templates/data/photo-ionisation.csv: a level of a neutral atom. */
export interface AtomicEdge {
  readonly number: number;
  readonly edgeAngstrom: number;
  readonly weight: number;
  readonly energyEv: number;
  readonly threshold: number;
  readonly power: number;
}

/**
 * Reads the text of templates/data/photo-ionisation.csv.
 * @throws RangeError when a cell is not a number.
 */
export function parseAtomicEdges(text: string): readonly AtomicEdge[] {
  const table = parseCsv(text);
  const number = numberColumn(table, 'number');
  const edge = numberColumn(table, 'edge');
  const weight = numberColumn(table, 'weight');
  const energy = numberColumn(table, 'energy');
  const threshold = numberColumn(table, 'threshold');
  const power = numberColumn(table, 'power');
  return Array.from(number, (_, row) => ({
    number: number[row]!,
    edgeAngstrom: edge[row]!,
    weight: weight[row]!,
    energyEv: energy[row]!,
    threshold: threshold[row]!,
    power: power[row]!,
  }));
}

/** Series limit of level n of hydrogen and of singly ionised helium, angstrom, per n^2. */
export const LYMAN_LIMIT_ANGSTROM = 911.753;
const IONISED_HELIUM_LIMIT_ANGSTROM = 227.94;
const IONISED_HELIUM_IONISATION_EV = 54.418;
/** Kramers' cross-section at the edge of level n is this times n, over Z^2, cm^2. */
export const KRAMERS_CROSS_SECTION = 7.907e-18;
const HYDROGEN_LEVELS = 15;
const IONISED_HELIUM_LEVELS = 8;
const HELIUM = 2;

/** Levels of a hydrogen-like ion of charge `charge` and population `ground(point)` per statistical weight. */
function hydrogenLike(
  gas: Gas,
  levels: number,
  limit: number,
  ionisationEv: number,
  charge: number,
  perWeight: (point: number) => number,
  share: (level: number, point: number) => number,
): Edge[] {
  return Array.from({ length: levels }, (_, index) => {
    const n = index + 1;
    const energy = ionisationEv * (1 - 1 / n ** 2);
    const population = new Float64Array(gas.length);
    for (let point = 0; point < gas.length; point += 1) {
      const boltzmann = Math.exp((-energy * KELVIN_PER_EV) / gas.temperature[point]!);
      population[point] = perWeight(point) * 2 * n * n * boltzmann * share(n, point);
    }
    return {
      edgeAngstrom: limit * n * n,
      threshold: (KRAMERS_CROSS_SECTION * n) / charge ** 2,
      power: 3,
      population,
    };
  });
}

/** Bound-free edges of hydrogen (levels 1-15, Kramers 1923), without the atoms whose level is dissolved. */
export function hydrogenEdges(gas: Gas): Edge[] {
  return hydrogenLike(
    gas,
    HYDROGEN_LEVELS,
    LYMAN_LIMIT_ANGSTROM,
    HYDROGEN_IONISATION_EV,
    1,
    (point) => gas.neutralHydrogen[point]! / 2,
    (level, point) => boundShare(level, gas.electrons[point]!),
  );
}

/** Ion shares of one element at every point of a gas, one array per stage. */
function sharesOf(gas: Gas, tables: GasTables, number: number): [Float64Array, Float64Array, Float64Array] {
  const shares: [Float64Array, Float64Array, Float64Array] = [
    new Float64Array(gas.length),
    new Float64Array(gas.length),
    new Float64Array(gas.length),
  ];
  const element = tables.elements.get(number)!;
  for (let point = 0; point < gas.length; point += 1) {
    const all = ionShares(tables.partitions, element, gas.temperature[point]!, gas.electrons[point]!);
    shares[0][point] = all[0];
    shares[1][point] = all[1];
    shares[2][point] = all[2];
  }
  return shares;
}

/** Bound-free edges of metals and helium, and the charge of helium that free-free absorption needs. */
export interface HeavyEdges {
  readonly edges: Edge[];
  /** Sum of n(ion) Z^2 of helium ions, cm^-3. */
  readonly heliumChargeSquared: Float64Array;
}

/** Bound-free edges of the listed atomic levels and of ionised helium (levels 1-8, hydrogen-like). */
export function heavyEdges(
  gas: Gas,
  composition: Composition,
  tables: GasTables,
  levels: readonly AtomicEdge[],
): HeavyEdges {
  const sharesByNumber = new Map<number, [Float64Array, Float64Array, Float64Array]>();
  for (const number of [HELIUM, ...levels.map((level) => level.number)]) {
    if (!sharesByNumber.has(number)) {
      sharesByNumber.set(number, sharesOf(gas, tables, number));
    }
  }
  const edges = levels.map((level): Edge => {
    const shares = sharesByNumber.get(level.number)!;
    const abundance = composition.perHydrogen.get(level.number) ?? 0;
    const symbol = tables.elements.get(level.number)!.symbol;
    const population = new Float64Array(gas.length);
    for (let point = 0; point < gas.length; point += 1) {
      const t = gas.temperature[point]!;
      const partition = partitionFunction(tables.partitions, symbol, 0, t) ?? 1;
      const boltzmann = Math.exp((-level.energyEv * KELVIN_PER_EV) / t);
      population[point] =
        (abundance * gas.hydrogenNuclei[point]! * shares[0][point]! * level.weight * boltzmann) / partition;
    }
    return {
      edgeAngstrom: level.edgeAngstrom,
      threshold: level.threshold,
      power: level.power,
      population,
    };
  });
  const helium = sharesByNumber.get(HELIUM)!;
  const heliumAbundance = composition.perHydrogen.get(HELIUM) ?? 0;
  const ionised = hydrogenLike(
    gas,
    IONISED_HELIUM_LEVELS,
    IONISED_HELIUM_LIMIT_ANGSTROM,
    IONISED_HELIUM_IONISATION_EV,
    2,
    (point) => (heliumAbundance * gas.hydrogenNuclei[point]! * helium[1][point]!) / 2,
    () => 1,
  );
  const heliumChargeSquared = gas.hydrogenNuclei.map(
    (nuclei, point) => heliumAbundance * nuclei * (helium[1][point]! + 4 * helium[2][point]!),
  );
  return { edges: [...edges, ...ionised], heliumChargeSquared };
}
