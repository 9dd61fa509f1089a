import { starburstAttenuation } from '../dust/starburst.ts';
import { behindDust } from '../dust/transmission.ts';
import type { Component, Family, LogGrid } from '../family.ts';
import { SEARCH_GROUPS, STRONG_GROUPS, WEAK_GROUPS } from '../lines/emission-groups.ts';
import { interstellarTransmission } from '../lines/interstellar.ts';
import { broaden, missingWidthKmS } from '../prepare/broaden.ts';
import { componentOf, lineComponent, present } from '../prepare/component.ts';
import {
  averagePairs,
  gridThrough,
  laidInto,
  pairedGrid,
  stepKmS,
  wavelengthsOf,
} from '../prepare/log-grid.ts';
import { principalVectors } from '../prepare/principal-vectors.ts';
import { neededForMixtures } from '../prepare/prune.ts';
import { STORED_SIGMA_KM_S } from '../stars/stored-grid.ts';
import { toUnitRms } from '../prepare/unit-rows.ts';
import { withFarUltraviolet } from './far-ultraviolet.ts';
import type { PopulationSet } from './population-set.ts';

/**
 * Rest wavelengths of the families, ångström: what optical spectra show from the lowest to the highest redshift
 * searched. Shortward of the stored light the ultraviolet slope goes on, so that no step is fitted there.
 */
const SHORTEST = 1280;
const LONGEST = 10_590;
/** Attenuation by dust inside the galaxy, A(V) magnitudes. */
const ATTENUATIONS = [0, 0.5, 1.2];
/** Velocity dispersion of the stars, km/s: a middling galaxy; the refit does not fit it. */
const STELLAR_SIGMA_KM_S = 170;
/** Populations younger than this (10⁹ years) still have gas in front of them. */
const OLDEST_WITH_GAS = 0.35;
/** Widths of emission lines, km/s: gas discs seen by a fibre, and blended, rotating or outflowing gas. */
const LINE_WIDTHS = { narrow: 60, wide: 200 } as const;
/** Search vectors for the starlight; the emission groups come on top. */
const STARLIGHT_VECTORS = 5;
/** Peculiar velocities reach 1,000 km/s towards us; [O II] leaves a spectrum that ends at 9,700 Å at 1.6. */
const REDSHIFT_MIN = -0.003;
const REDSHIFT_MAX = 1.6;
/** What mixtures of the others reproduce this well is not offered to the refit: half the mismatch. */
const PRUNE_TOLERANCE = 0.01;
/** Relative mismatch of the best model: 2 per cent of the local flux (prototype on bright galaxies). */
const MISMATCH = 0.02;

/** A spectrum of starlight the families are built from. */
interface Starlight {
  readonly label: string;
  readonly flux: Float32Array;
}

/** What does not depend on the line spread. */
export interface PreparedGalaxies {
  readonly grid: LogGrid;
  /** Populations × gas × dust, at the stored sharpness. */
  readonly starlight: readonly Starlight[];
  /** Indices into `starlight` of those the refit needs. */
  readonly needed: ReadonlySet<number>;
}

/** Puts gas and dust in front of the populations and finds which of them the refit needs. */
export function prepareGalaxies({ grid: stored, populations }: PopulationSet): PreparedGalaxies {
  const grid = gridThrough(stored, SHORTEST, LONGEST);
  const wavelengths = wavelengthsOf(grid);
  const gas = interstellarTransmission(grid, 1);
  const bare = populations.map(({ name, age, flux }) => ({
    label: name,
    age,
    flux: withFarUltraviolet(grid, laidInto(grid, stored, flux), Math.exp(stored.lnStart)),
  }));
  const withGas = bare
    .filter(({ age }) => age < OLDEST_WITH_GAS)
    .map(({ label, flux }) => ({ label: `${label} gas`, flux: flux.map((value, i) => value * gas[i]!) }));
  const starlight = [...bare, ...withGas].flatMap(({ label, flux }) =>
    ATTENUATIONS.map((amount) => ({
      label: `${label} av${amount}`,
      flux: behindDust(flux, wavelengths, starburstAttenuation, amount),
    })),
  );
  const coarse = starlight.map(({ flux }) => averagePairs(averagePairs(flux)));
  return { grid, starlight, needed: new Set(neededForMixtures(coarse, PRUNE_TOLERANCE)) };
}

/**
 * The two galaxy families, `galaxy-narrow` and `galaxy-wide`. They search with lines of one width each and
 * share one set of components with both widths.
 *
 * @param lineSpreadKmS Gaussian sigma of the instrument
 */
export function galaxyFamilies(
  { grid, starlight, needed }: PreparedGalaxies,
  lineSpreadKmS: number,
): Family[] {
  const target = Math.hypot(STELLAR_SIGMA_KM_S, lineSpreadKmS);
  const sigma = missingWidthKmS(target, STORED_SIGMA_KM_S) / stepKmS(grid);
  const broadened = starlight.map(({ flux }) => broaden(flux, sigma));
  const continua = broadened.flatMap((flux, k) =>
    needed.has(k) ? [componentOf(starlight[k]!.label, 'continuum', '', flux)] : [],
  );
  const components = [...continua, ...emissionComponents(grid, lineSpreadKmS)];
  const searchGrid = pairedGrid(grid);
  const starVectors = principalVectors(
    broadened.map((flux) => toUnitRms(averagePairs(flux))),
    STARLIGHT_VECTORS,
  );
  return Object.entries(LINE_WIDTHS).map(([name, width]) => ({
    name: `galaxy-${name}`,
    kind: 'galaxy',
    grid: searchGrid,
    componentGrid: grid,
    basis: [...starVectors, ...searchLines(searchGrid, Math.hypot(width, lineSpreadKmS))],
    redshiftMin: REDSHIFT_MIN,
    redshiftMax: REDSHIFT_MAX,
    refitSet: 'galaxy',
    componentsAt: () => components,
    multiplicativeOrder: 4,
    additiveOrder: -1,
    mismatch: MISMATCH,
  }));
}

function emissionComponents(grid: LogGrid, lineSpreadKmS: number): Component[] {
  const narrow = Math.hypot(LINE_WIDTHS.narrow, lineSpreadKmS);
  const wide = Math.hypot(LINE_WIDTHS.wide, lineSpreadKmS);
  return present([
    ...STRONG_GROUPS.map((group) => lineComponent(grid, group, 'narrow-line', ' narrow', narrow)),
    ...STRONG_GROUPS.map((group) => lineComponent(grid, group, 'narrow-line', ' wide', wide)),
    ...WEAK_GROUPS.map((group) => lineComponent(grid, group, 'narrow-line', ' narrow', narrow)),
  ]);
}

function searchLines(grid: LogGrid, sigmaKmS: number): Float32Array[] {
  return present(SEARCH_GROUPS.map((group) => lineComponent(grid, group, 'narrow-line', '', sigmaKmS))).map(
    ({ flux }) => toUnitRms(flux),
  );
}
