import type { Family, Kind } from '../../templates/family.ts';
import type { Measurement, MeasuredSpectrum } from './measurement.ts';
import { type RedshiftRange, refine } from './refine.ts';
import { type Refit, Refitter, ROUNDS_TO_RANK } from './refit.ts';
import type { RefitPixels } from './refit-pixels.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;

/** A redshift the search proposes: a minimum of one family's chi-square, or a peak of the correlation. */
export interface Proposal {
  readonly family: Family;
  readonly redshift: number;
  /** Of the search on the grid; compares proposals of one kind, roughly those of different kinds. */
  readonly chiSquare: number;
}

/** How much refitting one spectrum is worth. */
export interface Economy {
  /** Proposals of each kind that are refitted at all. */
  readonly refitsPerKind: Readonly<Record<Kind, number>>;
  /** Refits that are followed to the bottom of their valley. */
  readonly refined: number;
}

/**
 * Measured on the development spectra: the right redshift is among these in all but 0.1 per cent of those where
 * it is among 40.
 */
export const DEFAULT_ECONOMY: Economy = { refitsPerKind: { star: 9, galaxy: 10, quasar: 10 }, refined: 3 };

/** Proposals of one refit set nearer than this are one. */
const SAME_PROPOSAL_KM_S = 50;
/** Polynomial of the empty hypothesis: as free as the stars' multiplicative one, so that neither has an edge. */
const EMPTY_ORDER = 7;

/**
 * Refits the search's proposals with physical components on the native pixels, then follows the best to the
 * bottom of their valleys.
 */
export function measureCandidates(
  pixels: RefitPixels,
  proposals: readonly Proposal[],
  inflation: number,
  economy: Economy = DEFAULT_ECONOMY,
): MeasuredSpectrum {
  const refitter = new Refitter(pixels);
  const chosen = choose(proposals, economy);
  const warm = new Map<string, readonly number[]>();
  const measurements: Measurement[] = [];
  for (const { family, redshift } of chosen) {
    const refit = refitter.at(family, redshift, warm.get(family.refitSet), ROUNDS_TO_RANK);
    warm.set(family.refitSet, refit.activeIndices);
    if (refit.active.length === 0) continue;
    measurements.push(unrefined(family, refit));
  }
  const byMerit = [...measurements].sort((a, b) => merit(a, inflation) - merit(b, inflation));
  for (const one of distinctLeaders(byMerit, economy.refined)) {
    const range = rangeOfSet(proposals, one.family.refitSet);
    const { refit, sigmaKmS, atEdge } = refine(refitter, one.family, one.refit, range);
    measurements.push({ ...one, redshift: refit.redshift, refit, sigmaKmS, atEdge, refined: true });
  }
  const empty = refitter.polynomial(EMPTY_ORDER);
  const emptyChiSquare = empty.fitAlone(new Float64Array(pixels.count));
  return { pixels, measurements, emptyChiSquare, emptyFreedom: empty.freedom };
}

function unrefined(family: Family, refit: Refit): Measurement {
  return {
    kind: family.kind,
    family,
    redshift: refit.redshift,
    sigmaKmS: null,
    atEdge: false,
    refined: false,
    refit,
  };
}

function merit(one: Measurement, inflation: number): number {
  return one.refit.chiSquare / inflation + one.refit.price;
}

/** Windows of one set lie side by side: the end of a window is no end of the search. */
function rangeOfSet(proposals: readonly Proposal[], refitSet: string): RedshiftRange {
  const families = proposals.map(({ family }) => family).filter((family) => family.refitSet === refitSet);
  return {
    redshiftMin: Math.min(...families.map(({ redshiftMin }) => redshiftMin)),
    redshiftMax: Math.max(...families.map(({ redshiftMax }) => redshiftMax)),
  };
}

/** The best proposals of each kind, one per valley and refit set. */
function choose(proposals: readonly Proposal[], economy: Economy): Proposal[] {
  const left: Record<Kind, number> = { ...economy.refitsPerKind };
  const chosen: Proposal[] = [];
  for (const proposal of [...proposals].sort((a, b) => a.chiSquare - b.chiSquare)) {
    const kind = proposal.family.kind;
    const known = chosen.some(
      (other) =>
        other.family.refitSet === proposal.family.refitSet &&
        apartKmS(other.redshift, proposal.redshift) < SAME_PROPOSAL_KM_S,
    );
    if (known || left[kind] <= 0) continue;
    left[kind]--;
    chosen.push(proposal);
  }
  return chosen;
}

/** Leaders worth following: best first, each more than a valley apart from those before it or of another kind. */
function distinctLeaders(byMerit: readonly Measurement[], most: number): Measurement[] {
  const leaders: Measurement[] = [];
  for (const one of byMerit) {
    const near = leaders.some(
      (other) => other.kind === one.kind && apartKmS(other.redshift, one.redshift) < VALLEY_KM_S[one.kind],
    );
    if (near) continue;
    leaders.push(one);
    if (leaders.length >= most) break;
  }
  return leaders;
}

const VALLEY_KM_S: Readonly<Record<Kind, number>> = { star: 100, galaxy: 300, quasar: 1_500 };

function apartKmS(z1: number, z2: number): number {
  return (SPEED_OF_LIGHT_KM_S * Math.abs(z1 - z2)) / (1 + z1);
}
