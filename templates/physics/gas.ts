import { BOLTZMANN } from './constants.ts';
import type { Composition } from './composition.ts';
import type { Element } from './elements.ts';
import { dissociationConstant } from './molecule-equilibrium.ts';
import type { MoleculeEquilibrium } from './molecule-equilibrium.ts';
import type { PartitionFunctions } from './partition-functions.ts';
import { ionisationFactor } from './saha.ts';

/** The tables the state of the gas depends on. */
export interface GasTables {
  readonly elements: ReadonlyMap<number, Element>;
  readonly partitions: PartitionFunctions;
  readonly equilibrium: MoleculeEquilibrium;
}

/** Gas in local thermodynamic equilibrium at a list of points; densities are numbers per cm^3. */
export interface Gas {
  readonly length: number;
  /** Kelvin. */
  readonly temperature: Float64Array;
  /** Gas pressure, dyn cm^-2. */
  readonly pressure: Float64Array;
  readonly electrons: Float64Array;
  readonly neutralHydrogen: Float64Array;
  readonly protons: Float64Array;
  readonly molecularHydrogen: Float64Array;
  /** Hydrogen nuclei in any form. */
  readonly hydrogenNuclei: Float64Array;
  /** Gram per cm^3. */
  readonly massDensity: Float64Array;
}

/** He C N O Na Mg Al Si S K Ca Cr Fe Ni: together they give more than 99 per cent of the electrons. */
const DONORS = [2, 6, 7, 8, 11, 12, 13, 14, 16, 19, 20, 24, 26, 28];
/** Above this the few hydrogen molecules left matter to nothing and the table of their equilibrium ends. */
const NO_MOLECULES_ABOVE_K = 9000;
/** log10 of the least electron share searched: below any photosphere. */
const LEAST_LOG_SHARE = -12;
/** Halvings of the interval in log10: 12 / 2^45 is below double precision of the densities. */
const HALVINGS = 45;

interface Donor {
  readonly abundance: number;
  readonly first: number;
  readonly second: number;
}

/**
 * Neutral hydrogen density at a trial electron density: the positive root of
 * (2A+1)/K x^2 + (1+S/ne)(1+A) x - (N-ne) = 0, where A counts heavier atoms per hydrogen nucleus, K and S are
 * the constants of molecular dissociation and of ionisation and N all particles. Written to stay accurate
 * when the quadratic term vanishes.
 */
function neutralHydrogenAt(
  electrons: number,
  total: number,
  saha: number,
  dissociation: number,
  heavier: number,
): number {
  const a = (2 * heavier + 1) / dissociation;
  const b = (1 + saha / electrons) * (1 + heavier);
  const c = Math.max(total - electrons, 0);
  return (2 * c) / (b + Math.sqrt(b * b + 4 * a * c));
}

/** Electrons per cm^3 set free at a trial electron density. */
function freedElectrons(electrons: number, hydrogen: number, protons: number, donors: readonly Donor[]) {
  let perNucleus = 0;
  for (const donor of donors) {
    const first = donor.first / electrons;
    const second = (first * donor.second) / electrons;
    perNucleus += (donor.abundance * (first + 2 * second)) / (1 + first + second);
  }
  return protons + hydrogen * perNucleus;
}

/**
 * State of a gas of given composition at temperatures (K) and gas pressures (dyn cm^-2): charge and particle
 * conservation with Saha's equation for the electron donors and H2 as the only molecule that matters to the
 * pressure. The electron density is found by bisection, as in any textbook (e.g. Gray 2005, section 9.5).
 * @param temperature, pressure equally long, positive.
 */
export function solveGas(
  temperature: Float64Array,
  pressure: Float64Array,
  composition: Composition,
  tables: GasTables,
): Gas {
  const length = temperature.length;
  const gas = {
    length,
    temperature,
    pressure,
    electrons: new Float64Array(length),
    neutralHydrogen: new Float64Array(length),
    protons: new Float64Array(length),
    molecularHydrogen: new Float64Array(length),
    hydrogenNuclei: new Float64Array(length),
    massDensity: new Float64Array(length),
  };
  const hydrogen = tables.elements.get(1)!;
  for (let point = 0; point < length; point += 1) {
    const t = temperature[point]!;
    const total = pressure[point]! / (BOLTZMANN * t);
    const saha = ionisationFactor(tables.partitions, hydrogen, 0, t);
    const dissociation =
      t > NO_MOLECULES_ABOVE_K ? Infinity : dissociationConstant(tables.equilibrium, 'H2', t);
    const donors = DONORS.map((number): Donor => {
      const element = tables.elements.get(number)!;
      return {
        abundance: composition.perHydrogen.get(number) ?? 0,
        first: ionisationFactor(tables.partitions, element, 0, t),
        second: ionisationFactor(tables.partitions, element, 1, t),
      };
    });
    let low = LEAST_LOG_SHARE;
    let high = 0;
    for (let step = 0; step < HALVINGS; step += 1) {
      const middle = 0.5 * (low + high);
      const electrons = 10 ** middle * total;
      const neutral = neutralHydrogenAt(electrons, total, saha, dissociation, composition.heavierPerHydrogen);
      const protons = (neutral * saha) / electrons;
      const nuclei = neutral + protons + (2 * neutral * neutral) / dissociation;
      if (freedElectrons(electrons, nuclei, protons, donors) > electrons) {
        low = middle;
      } else {
        high = middle;
      }
    }
    const electrons = 10 ** (0.5 * (low + high)) * total;
    const neutral = neutralHydrogenAt(electrons, total, saha, dissociation, composition.heavierPerHydrogen);
    const molecules = (neutral * neutral) / dissociation;
    const nuclei = neutral * (1 + saha / electrons) + 2 * molecules;
    gas.electrons[point] = electrons;
    gas.neutralHydrogen[point] = neutral;
    gas.protons[point] = (neutral * saha) / electrons;
    gas.molecularHydrogen[point] = molecules;
    gas.hydrogenNuclei[point] = nuclei;
    gas.massDensity[point] = nuclei * composition.massPerHydrogen;
  }
  return gas;
}
