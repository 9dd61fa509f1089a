import type { Family } from '../../templates/family.ts';
import { correlatePacked } from './correlate-packed.ts';
import type { VectorTransform } from './data-transforms.ts';
import { familyTransforms } from './family-transforms.ts';
import type { LagLayout } from './lag-layout.ts';
import { eliminateOrthonormal, type NormalEntries, pivotFloor, solveExplained } from './normal-entries.ts';
import { partialElimination } from './partial-cover.ts';
import type { SearchData } from './search-data.ts';
import { type MatchWorkspace, scratch, zeroed } from './workspace.ts';

/** Chi-square of one family at every lag, lowest lag (highest redshift) first; NaN where too little is covered. */
export interface LagScan {
  readonly chiSquare: Float64Array;
  /** Part of the weight inside the family's grid, 0..1. */
  readonly covered: Float64Array;
}

/** Transforms of the data in one layout: the weights, the weighted flux, and every arm's weighted polynomials. */
export interface DataTransforms {
  readonly weight: VectorTransform;
  readonly weightedFlux: VectorTransform;
  readonly nuisances: readonly VectorTransform[];
}

/**
 * Chi-square of the best fit Σ a_k T_k(s) + polynomials at every lag s.
 *
 * The obvious form: for each lag, solve the weighted least squares of the data on K shifted spectra and P
 * polynomials. All entries of its normal matrix are correlations, so Fourier transforms give them for all lags
 * at once; the polynomials are orthonormal under w, so eliminating them is a sum of products (Schur
 * complement), and a K × K solve is left for each lag.
 *
 * @param lowestLag template pixel − data pixel at output place 0
 * @param leastCovered part of the weight below which a lag is not tried
 */
export function scanFamily(
  family: Family,
  data: SearchData,
  transforms: DataTransforms,
  layout: LagLayout,
  lowestLag: number,
  leastCovered: number,
  workspace: MatchWorkspace,
): LagScan {
  const entries = normalEntries(family, transforms, layout, workspace);
  const chiSquare = new Float64Array(layout.lags);
  const covered = new Float64Array(layout.lags);
  const inside = coverOf(data, family.grid.length, lowestLag, layout.lags);
  const { wholeFirst, wholeEnd } = inside;
  const floor = pivotFloor(entries, layout.lags);
  eliminateOrthonormal(entries, wholeFirst, wholeEnd);
  const polynomials = new Float64Array(layout.lags).fill(data.polynomialChiSquare);
  covered.fill(1, wholeFirst, wholeEnd);
  const eliminate = partialElimination(entries, data);
  for (let t = 0; t < layout.lags; t++) {
    if (t === wholeFirst) t = wholeEnd;
    if (t >= layout.lags) break;
    const first = inside.firstPixel(t);
    const end = inside.endPixel(t);
    covered[t] = (data.weightSums[end]! - data.weightSums[first]!) / data.weightSums[data.length]!;
    polynomials[t] = covered[t]! < leastCovered ? NaN : eliminate(t, first, end);
  }
  solveExplained(entries, 0, layout.lags, floor, chiSquare);
  for (let t = 0; t < layout.lags; t++) chiSquare[t] = polynomials[t]! - chiSquare[t]!;
  return { chiSquare, covered };
}

/** Which data pixels lie inside the family's grid at each lag, and at which lags all that have weight do. */
function coverOf(
  data: SearchData,
  familyLength: number,
  lowestLag: number,
  lags: number,
): {
  wholeFirst: number;
  wholeEnd: number;
  firstPixel(t: number): number;
  endPixel(t: number): number;
} {
  const firstWeighted = data.weight.findIndex((w) => w > 0);
  const lastWeighted = data.weight.findLastIndex((w) => w > 0);
  const within = (t: number): number => Math.min(Math.max(t, 0), lags);
  const wholeFirst = within(-firstWeighted - lowestLag);
  const firstPixel = (t: number): number => Math.min(Math.max(0, -(lowestLag + t)), data.length);
  return {
    wholeFirst,
    wholeEnd: Math.max(wholeFirst, within(familyLength - lastWeighted - lowestLag)),
    firstPixel,
    endPixel: (t) => Math.max(firstPixel(t), Math.min(data.length, familyLength - lowestLag - t)),
  };
}

function normalEntries(
  family: Family,
  transforms: DataTransforms,
  layout: LagLayout,
  workspace: MatchWorkspace,
): NormalEntries {
  const templates = familyTransforms(family, layout);
  const size = family.basis.length;
  const re = scratch(workspace, 're', layout.size).subarray(0, layout.size);
  const im = scratch(workspace, 'im', layout.size).subarray(0, layout.size);
  const gram: Float64Array[] = [];
  for (let j = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) gram[j * size + k] = zeroed(workspace, `gram ${j} ${k}`, layout.lags);
  }
  for (const pair of templates.products) {
    correlatePacked(transforms.weight, pair, layout, re, im, (entry) => {
      const [j, k] = templates.productOf[entry]!;
      return gram[j * size + k]!;
    });
  }
  const right: Float64Array[] = [];
  const nuisance: Float64Array[] = [];
  for (const pair of templates.rows) {
    correlatePacked(transforms.weightedFlux, pair, layout, re, im, (k) => {
      right[k] = scratch(workspace, `right ${k}`, layout.lags);
      return right[k];
    });
    transforms.nuisances.forEach((vector, p) => {
      correlatePacked(vector, pair, layout, re, im, (k) => {
        const array = scratch(workspace, `nuisance ${p} ${k}`, layout.lags);
        nuisance[p * size + k] = array;
        return array;
      });
    });
  }
  return { size, gram, right, nuisance };
}
