import { BOLTZMANN, LIGHT_SPEED, SECOND_RADIATION, THOMSON_CROSS_SECTION } from './constants.ts';
import type { Composition } from './composition.ts';
import type { Gas, GasTables } from './gas.ts';
import { hminusBoundFree, hminusFreeFree, hminusFreeFreeSeries } from './hminus.ts';
import { boundShare } from './occupation.ts';
import { heavyEdges, hydrogenEdges, LYMAN_LIMIT_ANGSTROM } from './photo-ionisation.ts';
import type { AtomicEdge, Edge } from './photo-ionisation.ts';

/** A gas with everything that its continuous opacity needs and that does not depend on wavelength. */
export interface ContinuumSource {
  readonly gas: Gas;
  readonly edges: readonly Edge[];
  /** The first levels of hydrogen: their absorption goes on longward of the edge, into dissolved levels. */
  readonly lowHydrogen: readonly Edge[];
  /** Free-free absorption by protons and helium ions: 3.69e8 g n_e sum(n Z^2) / sqrt(T). */
  readonly freeFree: Float64Array;
  /** n(H I) times electron pressure: what the H- coefficients are multiplied by. */
  readonly hminusWeight: Float64Array;
}

/** Free-free coefficient of hydrogen-like ions, cgs (e.g. Gray 2005, eq. 8.10) and a mean Gaunt factor. */
const FREE_FREE_COEFFICIENT = 3.69e8;
const FREE_FREE_GAUNT = 1.1;
/** Levels whose bound-free absorption is continued into the dissolved levels, and how far beyond the edge. */
const CONTINUED_LEVELS = 4;
const CONTINUED_TO = 1.25;
/** Rayleigh scattering formulae do not hold near Lyman alpha: constant below this, angstrom. */
const RAYLEIGH_LIMIT_ANGSTROM = 1026;

/** Collects what the continuous opacity of a gas needs. */
export function prepareContinuum(
  gas: Gas,
  composition: Composition,
  tables: GasTables,
  levels: readonly AtomicEdge[],
): ContinuumSource {
  const hydrogen = hydrogenEdges(gas);
  const heavy = heavyEdges(gas, composition, tables, levels);
  const freeFree = new Float64Array(gas.length);
  const hminusWeight = new Float64Array(gas.length);
  for (let point = 0; point < gas.length; point += 1) {
    const t = gas.temperature[point]!;
    const electrons = gas.electrons[point]!;
    freeFree[point] =
      (FREE_FREE_COEFFICIENT *
        FREE_FREE_GAUNT *
        electrons *
        (gas.protons[point]! + heavy.heliumChargeSquared[point]!)) /
      Math.sqrt(t);
    hminusWeight[point] = gas.neutralHydrogen[point]! * electrons * BOLTZMANN * t;
  }
  return {
    gas,
    edges: [...hydrogen, ...heavy.edges],
    lowHydrogen: hydrogen.slice(0, CONTINUED_LEVELS),
    freeFree,
    hminusWeight,
  };
}

/** Rayleigh cross-sections, cm^2: neutral hydrogen and molecular hydrogen (Dalgarno 1962; Dalgarno & Williams 1962). */
function rayleigh(wavelengthAngstrom: number): { atom: number; molecule: number } {
  const l2 = Math.max(wavelengthAngstrom, RAYLEIGH_LIMIT_ANGSTROM) ** 2;
  const l4 = l2 * l2;
  return {
    atom: (5.799e-13 + (1.422e-6 + 2.784 / l2) / l2) / l4,
    molecule: (8.14e-13 + (1.28e-6 + 1.61 / l2) / l2) / l4,
  };
}

/** Adds absorption into the dissolved upper levels of hydrogen, longward of the edges of levels 1-4. */
function addDissolved(source: ContinuumSource, wavelengthAngstrom: number, out: Float64Array): void {
  for (const [index, edge] of source.lowHydrogen.entries()) {
    const level = index + 1;
    const beyond = wavelengthAngstrom > edge.edgeAngstrom;
    if (!beyond || wavelengthAngstrom >= edge.edgeAngstrom * CONTINUED_TO) {
      continue;
    }
    const reached = 1 / Math.sqrt(1 / level ** 2 - LYMAN_LIMIT_ANGSTROM / wavelengthAngstrom);
    if (reached <= level + 1) {
      continue;
    }
    const sigma = edge.threshold * (wavelengthAngstrom / edge.edgeAngstrom) ** edge.power;
    for (let point = 0; point < out.length; point += 1) {
      const dissolved = 1 - boundShare(reached, source.gas.electrons[point]!);
      out[point]! += edge.population[point]! * sigma * dissolved;
    }
  }
}

/**
 * Continuous absorption and scattering coefficient, cm^-1, at one vacuum wavelength (angstrom) for every
 * point of the source: H- (John 1988), bound-free and free-free of hydrogen, helium and metals, Rayleigh and
 * Thomson scattering (treated as absorption).
 * @param out receives the coefficients; as long as the gas.
 */
export function continuumOpacity(
  source: ContinuumSource,
  wavelengthAngstrom: number,
  out: Float64Array,
): void {
  const { gas } = source;
  out.fill(0);
  for (const edge of source.edges) {
    if (wavelengthAngstrom > edge.edgeAngstrom) {
      continue;
    }
    const sigma = edge.threshold * (wavelengthAngstrom / edge.edgeAngstrom) ** edge.power;
    const { population } = edge;
    for (let point = 0; point < out.length; point += 1) {
      out[point]! += population[point]! * sigma;
    }
  }
  addDissolved(source, wavelengthAngstrom, out);
  const centimetre = wavelengthAngstrom * 1e-8;
  const frequencyCubed = (LIGHT_SPEED / centimetre) ** 3;
  const series = hminusFreeFreeSeries(wavelengthAngstrom);
  const scattering = rayleigh(wavelengthAngstrom);
  for (let point = 0; point < out.length; point += 1) {
    const t = gas.temperature[point]!;
    const stimulated = 1 - Math.exp(-SECOND_RADIATION / (centimetre * t));
    const hminus = hminusBoundFree(wavelengthAngstrom, t) + hminusFreeFree(series, t);
    out[point] =
      (out[point]! + source.freeFree[point]! / frequencyCubed) * stimulated +
      source.hminusWeight[point]! * hminus +
      gas.neutralHydrogen[point]! * scattering.atom +
      gas.molecularHydrogen[point]! * scattering.molecule +
      gas.electrons[point]! * THOMSON_CROSS_SECTION;
  }
}
