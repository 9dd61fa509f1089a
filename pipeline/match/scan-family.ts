import type { Family } from '../../templates/family.ts';
import { correlatePacked } from './correlate-packed.ts';
import type { VectorTransform } from './data-transforms.ts';
import { familyTransforms } from './family-transforms.ts';
import type { LagLayout } from './lag-layout.ts';
import { explained, type NormalEntries } from './normal-entries.ts';
import { coveredChiSquare } from './partial-cover.ts';
import type { SearchData } from './search-data.ts';
import { type MatchWorkspace, scratch } from './workspace.ts';

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
  const total = data.weightSums[data.length]!;
  const size = entries.size;
  const matrix = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let t = 0; t < layout.lags; t++) {
    const lag = lowestLag + t;
    const first = Math.min(Math.max(0, -lag), data.length);
    const end = Math.max(first, Math.min(data.length, family.grid.length - lag));
    const inside = data.weightSums[end]! - data.weightSums[first]!;
    covered[t] = inside / total;
    const whole = data.weightSums[first] === 0 && data.weightSums[end] === total;
    if (whole) chiSquare[t] = wholeChiSquare(entries, data, t, matrix, right);
    else if (covered[t]! < leastCovered) chiSquare[t] = NaN;
    else chiSquare[t] = coveredChiSquare(entries, data, t, first, end);
  }
  return { chiSquare, covered };
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
  const gram = new Array<Float64Array | null>(size * size).fill(null);
  for (const pair of templates.products) {
    correlatePacked(transforms.weight, pair, layout, re, im, (entry) => {
      const [j, k] = templates.productOf[entry]!;
      const array = scratch(workspace, `gram ${j} ${k}`, layout.lags);
      gram[j * size + k] = array;
      return array;
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

/** All of the data inside the family's grid: the polynomials' Gram matrix is the unit matrix. */
function wholeChiSquare(
  entries: NormalEntries,
  data: SearchData,
  t: number,
  matrix: Float64Array,
  right: Float64Array,
): number {
  const { size, gram, nuisance } = entries;
  for (let j = 0; j < size; j++) {
    right[j] = entries.right[j]![t]!;
    for (let k = 0; k <= j; k++) {
      let sum = gram[j * size + k]?.[t] ?? 0;
      for (let p = 0; p < nuisance.length; p += size) sum -= nuisance[p + j]![t]! * nuisance[p + k]![t]!;
      matrix[j * size + k] = sum;
    }
  }
  return data.polynomialChiSquare - explained(matrix, right, size);
}
