import { galacticExtinction } from '../dust/galactic.ts';
import { behindDust } from '../dust/transmission.ts';
import type { Family } from '../family.ts';
import type { StarGroup } from '../stars/parameters.ts';
import { STORED_SIGMA_KM_S } from '../stars/stored-grid.ts';
import { broaden, missingWidthKmS } from './broaden.ts';
import { componentOf } from './component.ts';
import { averagePairs, pairedGrid, stepKmS, wavelengthsOf } from './log-grid.ts';
import { principalVectors } from './principal-vectors.ts';
import { neededForMixtures } from './prune.ts';
import { toUnitRms } from './unit-rows.ts';
import type { StarGrid, StarModel } from './star-grid.ts';

/** Which models a family takes: groups and a half-open range of temperature, K. */
interface Membership {
  readonly name: string;
  readonly groups: readonly StarGroup[];
  readonly from: number;
  readonly below: number;
  readonly mismatch: number;
}

const COOL: readonly StarGroup[] = ['dwarf', 'giant'];
const HOT: readonly StarGroup[] = ['dwarf', 'horizontal-branch', 'supergiant'];

/**
 * Neighbouring families share models at their border, so that a star there is not cut in two. Mismatch: 2 per
 * cent of the local flux describes F to A stars with 4,500 lines; cool stars, whose molecular bands rest on few
 * constants, and carbon stars with three models are worse (reduced chi-square of bright stars, measured on the
 * prototype of these models).
 */
const MEMBERSHIPS: readonly Membership[] = [
  { name: 'star-m', groups: COOL, from: 0, below: 3901, mismatch: 0.06 },
  { name: 'star-k', groups: COOL, from: 3800, below: 5300, mismatch: 0.03 },
  { name: 'star-fg', groups: COOL, from: 5000, below: 7201, mismatch: 0.02 },
  { name: 'star-a', groups: HOT, from: 7001, below: 10601, mismatch: 0.02 },
  { name: 'star-ob', groups: HOT, from: 10001, below: Infinity, mismatch: 0.03 },
  { name: 'star-wd', groups: ['white-dwarf'], from: 0, below: Infinity, mismatch: 0.03 },
  { name: 'star-c', groups: ['carbon'], from: 0, below: Infinity, mismatch: 0.08 },
];

/** Foreground dust a star may lie behind, A(V) magnitudes; the polynomial of the refit fills in between. */
const EXTINCTIONS = [0, 1, 2.5];
/** Search vectors per family: more did not change who was right (ablation of the prototype). */
const SEARCH_VECTORS = 4;
/** ±1,500 km/s: beyond the escape velocity of the Galaxy. */
const REDSHIFT_LIMIT = 0.005;
/** Order of the multiplicative polynomial: takes up imperfect flux calibration (tuned on the prototype). */
const MULTIPLICATIVE_ORDER = 7;
/** What mixtures of the others reproduce this well is not offered: half the smallest mismatch. */
const PRUNE_TOLERANCE = 0.01;

interface StarSet {
  readonly membership: Membership;
  readonly members: readonly StarModel[];
  /** Indices into members × extinctions (extinction fastest) of those the refit needs. */
  readonly needed: ReadonlySet<number>;
}

/** What does not depend on the line spread: who belongs where, and which spectra the refit needs. */
export interface PreparedStars {
  readonly stars: StarGrid;
  readonly sets: readonly StarSet[];
  /** Transmission of each extinction on the grid of the stars. */
  readonly dust: readonly Float32Array[];
}

/** Sorts the models into families. Takes a few tenths of a second; once per library. */
export function prepareStars(stars: StarGrid): PreparedStars {
  const wavelengths = wavelengthsOf(stars.grid);
  const clear = new Float32Array(stars.grid.length).fill(1);
  const dust = EXTINCTIONS.map((amount) => behindDust(clear, wavelengths, galacticExtinction, amount));
  const sets = MEMBERSHIPS.map((membership) => {
    const members = stars.models.filter(
      ({ group, temperature }) =>
        membership.groups.includes(group) && temperature >= membership.from && temperature < membership.below,
    );
    if (members.length === 0) throw new RangeError(`${membership.name} must have members, got none`);
    // Quarter resolution is enough to see which spectra are mixtures of others.
    const coarse = members.flatMap(({ flux }) =>
      dust.map((through) => averagePairs(averagePairs(product(flux, through)))),
    );
    return { membership, members, needed: new Set(neededForMixtures(coarse, PRUNE_TOLERANCE)) };
  });
  return { stars, sets, dust };
}

/**
 * The stellar families at a line spread: M, K, F–G, A, O–B, white dwarfs (DA), carbon stars.
 *
 * @param lineSpreadKmS Gaussian sigma of the instrument; below the 25 km/s stored nothing is added
 */
export function starFamilies({ stars, sets, dust }: PreparedStars, lineSpreadKmS: number): Family[] {
  const sigma = missingWidthKmS(lineSpreadKmS, STORED_SIGMA_KM_S) / stepKmS(stars.grid);
  const broadened = new Map<StarModel, Float32Array>();
  const sharpToSpread = (model: StarModel): Float32Array => {
    const flux = broadened.get(model) ?? broaden(model.flux, sigma);
    broadened.set(model, flux);
    return flux;
  };
  return sets.map(({ membership, members, needed }) => {
    const rows = members.flatMap((model) => {
      const flux = sharpToSpread(model);
      return dust.map((through) => product(flux, through));
    });
    const components = rows.flatMap((flux, k) => {
      if (!needed.has(k)) return [];
      const model = members[Math.floor(k / dust.length)]!;
      const label = `${model.name} av${EXTINCTIONS[k % dust.length]!}`;
      return [componentOf(label, 'continuum', '', flux)];
    });
    return {
      name: membership.name,
      kind: 'star',
      grid: pairedGrid(stars.grid),
      componentGrid: stars.grid,
      basis: principalVectors(
        rows.map((row) => toUnitRms(averagePairs(row))),
        SEARCH_VECTORS,
      ),
      redshiftMin: -REDSHIFT_LIMIT,
      redshiftMax: REDSHIFT_LIMIT,
      refitSet: membership.name,
      componentsAt: () => components,
      multiplicativeOrder: MULTIPLICATIVE_ORDER,
      additiveOrder: -1,
      mismatch: membership.mismatch,
    };
  });
}

function product(a: Float32Array, b: Float32Array): Float32Array {
  const result = new Float32Array(a.length);
  for (let i = 0; i < a.length; i++) result[i] = a[i]! * b[i]!;
  return result;
}
