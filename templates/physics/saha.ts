import { BOLTZMANN, ELECTRON_MASS, KELVIN_PER_EV, PLANCK } from './constants.ts';
import type { Element } from './elements.ts';
import { partitionFunction } from './partition-functions.ts';
import type { PartitionFunctions } from './partition-functions.ts';

/** Stands for a partition function that the table does not hold: a closed shell or a high ion. */
const CLOSED_SHELL = 1;

/**
 * Saha's factor n(next stage) n(electron) / n(this stage), cm^-3, at a temperature in kelvin
 * (Saha 1921; e.g. Gray 2005, eq. 1.20), for a ratio of partition functions U(next)/U(this) and an
 * ionisation energy in eV.
 */
export function sahaFactor(temperature: number, partitionRatio: number, ionisationEv: number): number {
  const thermal = (2 * Math.PI * ELECTRON_MASS * BOLTZMANN * temperature) / PLANCK ** 2;
  return 2 * thermal ** 1.5 * partitionRatio * Math.exp((-ionisationEv * KELVIN_PER_EV) / temperature);
}

/** Saha's factor of an element between `stage` (0, 1 or 2) and the next one; 0 when there is no next one. */
export function ionisationFactor(
  partitions: PartitionFunctions,
  element: Element,
  stage: number,
  temperature: number,
): number {
  const energy = element.ionisationEv[stage];
  if (energy === undefined || Number.isNaN(energy)) {
    return 0;
  }
  const lower = partitionFunction(partitions, element.symbol, stage, temperature) ?? CLOSED_SHELL;
  const upper = partitionFunction(partitions, element.symbol, stage + 1, temperature) ?? CLOSED_SHELL;
  return sahaFactor(temperature, upper / lower, energy);
}

/** Shares of the atoms of an element in stages 0, 1, 2 and 3 (sum 1) at an electron density in cm^-3. */
export function ionShares(
  partitions: PartitionFunctions,
  element: Element,
  temperature: number,
  electronDensity: number,
): [number, number, number, number] {
  const first = ionisationFactor(partitions, element, 0, temperature) / electronDensity;
  const second = (first * ionisationFactor(partitions, element, 1, temperature)) / electronDensity;
  const third = (second * ionisationFactor(partitions, element, 2, temperature)) / electronDensity;
  const total = 1 + first + second + third;
  return [1 / total, first / total, second / total, third / total];
}
