import type { Family, Kind } from '../../templates/family.ts';
import type { Refit, Refitter } from './refit.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;

/** First step of the walk, about a third of the width of the kind's chi-square valley at R = 2000. */
const FIRST_STEP_KM_S: Readonly<Record<Kind, number>> = { star: 30, galaxy: 40, quasar: 250 };
/** A walk longer than this has left the valley the search found. */
const LONGEST_WALK = 6;

/** Where a search looked; a family's own range, or that of all families that share its components. */
export interface RedshiftRange {
  readonly redshiftMin: number;
  readonly redshiftMax: number;
}

/** Best redshift of one valley. */
export interface Refined {
  readonly refit: Refit;
  /** Formal 1-sigma from the curvature, km/s in c·Δz/(1+z); null when the valley has no curvature. */
  readonly sigmaKmS: number | null;
  /** True when the bottom lies at or beyond the edge of the range: the true one may be further on. */
  readonly atEdge: boolean;
}

/**
 * Walks to the bottom of the chi-square valley around a starting point by exact refits: three points, step
 * downhill until the middle is lowest, then once more with a step matched to the valley's own width.
 * The error is the step at which the parabola through the last three points rises by one.
 *
 * Along a walk only the components active at its start take part: a step is a tenth of the cost, and chi-square
 * stays a smooth function of redshift. All components are offered again where a walk ends.
 */
export function refine(
  refitter: Refitter,
  family: Family,
  start: Refit,
  range: RedshiftRange = family,
): Refined {
  const coarse = walk(refitter, family, start, FIRST_STEP_KM_S[family.kind], range);
  if (coarse.sigmaKmS === null) return coarse;
  const step = Math.min(Math.max(coarse.sigmaKmS, 1), FIRST_STEP_KM_S[family.kind]);
  const fine = walk(refitter, family, coarse.refit, step, range);
  return { ...fine, sigmaKmS: fine.sigmaKmS ?? coarse.sigmaKmS, atEdge: coarse.atEdge || fine.atEdge };
}

function walk(
  refitter: Refitter,
  family: Family,
  start: Refit,
  stepKmS: number,
  range: RedshiftRange,
): Refined {
  const found = walkWith(refitter, onlyActive(family, start), start, stepKmS, range);
  return { ...found, refit: refitter.at(family, found.refit.redshift, start.activeIndices) };
}

/** The family with the components that are active in a refit, and no others. */
function onlyActive(family: Family, { activeIndices }: Refit): Family {
  return {
    ...family,
    componentsAt: (redshift) => {
      const all = family.componentsAt(redshift);
      return activeIndices.map((index) => all[index]!);
    },
  };
}

function walkWith(
  refitter: Refitter,
  family: Family,
  start: Refit,
  stepKmS: number,
  range: RedshiftRange,
): Refined {
  const h = stepKmS / SPEED_OF_LIGHT_KM_S;
  const at = (from: Refit, steps: number): Refit =>
    refitter.at(family, Math.expm1(Math.log1p(from.redshift) + steps * h), everyIndex);
  const everyIndex = start.activeIndices.map((_, position) => position);
  let middle = at(start, 0);
  let left = at(middle, -1);
  let right = at(middle, 1);
  let walked = 0;
  while (walked < LONGEST_WALK && (cost(left) < cost(middle) || cost(right) < cost(middle))) {
    if (cost(left) < cost(right)) [right, middle, left] = [middle, left, at(left, -1)];
    else [left, middle, right] = [middle, right, at(right, 1)];
    walked++;
  }
  const atEdge = middle.redshift <= range.redshiftMin || middle.redshift >= range.redshiftMax;
  const curvature = cost(left) - 2 * cost(middle) + cost(right);
  if (!(curvature > 0)) return { refit: middle, sigmaKmS: null, atEdge };
  const vertex = (0.5 * (cost(left) - cost(right))) / curvature;
  const sigmaKmS = stepKmS * Math.sqrt(2 / curvature);
  if (Math.abs(vertex) > 1 || Math.abs(vertex) < 1e-3) return { refit: middle, sigmaKmS, atEdge };
  const bottom = at(middle, vertex);
  return { refit: cost(bottom) <= cost(middle) ? bottom : middle, sigmaKmS, atEdge };
}

/** Chi-square and the price of freedom move together: a component that enters must not look like a better redshift. */
function cost(refit: Refit): number {
  return refit.chiSquare + refit.price;
}
