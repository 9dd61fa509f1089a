import { ATOMIC_MASS_UNIT } from './constants.ts';
import type { Element } from './elements.ts';

/** Abundances of one star. */
export interface Composition {
  /** Atoms per hydrogen atom, by atomic number. */
  readonly perHydrogen: ReadonlyMap<number, number>;
  /** Sum of all elements but hydrogen, atoms per hydrogen atom. */
  readonly heavierPerHydrogen: number;
  /** Gram of gas per hydrogen atom. */
  readonly massPerHydrogen: number;
}

/** O, Ne, Mg, Si, S, Ar, Ca and Ti rise together in old stars. */
const ALPHA_ELEMENTS: ReadonlySet<number> = new Set([8, 10, 12, 14, 16, 18, 20, 22]);
const HELIUM = 2;
const CARBON = 6;

/**
 * Solar composition scaled by logarithmic amounts (dex): `metallicity` for every element beyond helium,
 * `alpha` on top for the alpha elements, `carbon` on top for carbon.
 */
export function compose(
  elements: ReadonlyMap<number, Element>,
  metallicity: number,
  alpha: number,
  carbon: number,
): Composition {
  const perHydrogen = new Map<number, number>();
  let mass = 0;
  let sum = 0;
  for (const element of elements.values()) {
    let dex = element.number > HELIUM ? metallicity : 0;
    dex += ALPHA_ELEMENTS.has(element.number) ? alpha : 0;
    dex += element.number === CARBON ? carbon : 0;
    const abundance = element.solarAbundance * 10 ** dex;
    perHydrogen.set(element.number, abundance);
    mass += abundance * element.weight;
    sum += abundance;
  }
  const hydrogen = perHydrogen.get(1) ?? 1;
  return {
    perHydrogen,
    heavierPerHydrogen: sum - hydrogen,
    massPerHydrogen: mass * ATOMIC_MASS_UNIT,
  };
}
