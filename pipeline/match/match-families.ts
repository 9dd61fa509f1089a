import type { Family } from '../../templates/family.ts';
import type { Grid } from '../grid/grid.ts';
import {
  type CorrelationCurve,
  type CorrelationPeak,
  correlationSearch,
  highestPeaks,
} from './correlation-search.ts';
import { transformVectors } from './data-transforms.ts';
import { type LagLayout, lagsFor, layOutLags, lnOnePlusRedshift } from './lag-layout.ts';
import { DEFAULT_MATCH_OPTIONS, type MatchOptions } from './match-options.ts';
import { deepestMinima, type Minimum, type RedshiftCurve } from './minima.ts';
import { type DataTransforms, scanFamily } from './scan-family.ts';
import { prepareSearch, type SearchData } from './search-data.ts';
import { createMatchWorkspace, type MatchWorkspace } from './workspace.ts';

/** Correlation peaks below this r are noise more often than not (Kurtz & Mink 1998, section 5). */
const LEAST_R = 3;
/** Candidates of one refit set closer than this are refined to the same place. */
const TWIN_STEPS = 1.5;

/** What the search found for one family. */
export interface FamilyMatch extends RedshiftCurve {
  readonly family: Family;
  /** Part of the weight inside the family's grid at each redshift, 0..1. */
  readonly covered: Float64Array;
  /** Deepest first. */
  readonly minima: readonly Minimum[];
  /** Cross-correlation with the family's leading spectrum and, where it has lines, with those. */
  readonly correlations: readonly CorrelationCurve[];
  /** Highest first, of all correlations. */
  readonly peaks: readonly CorrelationPeak[];
}

/** One redshift hypothesis for the refit. */
export interface Candidate {
  readonly family: Family;
  readonly redshift: number;
  /** Of the free linear fit on the grid, all pixels. */
  readonly chiSquare: number;
  readonly atEdge: boolean;
  /** Part of the weight the family covers there. */
  readonly covered: number;
  readonly from: 'chi-square' | 'correlation';
}

/** The outcome of the search over all families. */
export interface Match {
  readonly families: readonly FamilyMatch[];
  /** Smallest chi-square first; one per refit set and grid step. */
  readonly candidates: readonly Candidate[];
  /** Chi-square of the arms' polynomials alone: what 'no object features' scores. */
  readonly polynomialChiSquare: number;
  readonly polynomialTerms: number;
  /** Pixels with weight, over all arms of the grid. */
  readonly pixels: number;
}

/**
 * Compares a spectrum with every family at every redshift of the family's range.
 *
 * @param families on the grid's step
 * @param workspace scratch kept between calls; one per thread
 * @throws RangeError when a family has another step than the grid
 */
export function matchFamilies(
  grid: Grid,
  families: readonly Family[],
  options: MatchOptions = DEFAULT_MATCH_OPTIONS,
  workspace: MatchWorkspace = createMatchWorkspace(),
): Match {
  const data = prepareSearch(grid, options);
  const transformsOf = transformsByLayout(data, workspace);
  const correlate = correlationSearch(grid, options, workspace);
  const matches = families.map((family): FamilyMatch => {
    const scan = matchFamily(grid, family, data, transformsOf, options, workspace);
    const correlations = correlate(family);
    const separation = options.separationKmS[family.kind];
    const peaks = correlations
      .flatMap((curve) => highestPeaks(curve, options.correlationPeaks, separation))
      .sort((a, b) => b.height - a.height);
    return { ...scan, correlations, peaks };
  });
  return {
    families: matches,
    candidates: candidatesOf(matches, grid.step, options),
    polynomialChiSquare: data.polynomialChiSquare,
    polynomialTerms: data.polynomialTerms,
    pixels: data.pixels,
  };
}

/** Data transforms, shared by the families whose layouts cut the data alike. */
function transformsByLayout(
  data: SearchData,
  workspace: MatchWorkspace,
): (layout: LagLayout) => DataTransforms {
  const known = new Map<string, DataTransforms>();
  return (layout) => {
    const key = `${layout.size} ${layout.segment}`;
    const old = known.get(key);
    if (old !== undefined) return old;
    const polynomials = data.nuisances.flatMap(({ offset, weightedRows }) =>
      weightedRows.map((values) => ({ offset, values })),
    );
    const [weight, weightedFlux, ...nuisances] = transformVectors(
      [{ offset: 0, values: data.weight }, { offset: 0, values: data.weightedFlux }, ...polynomials],
      layout,
      workspace,
      'search',
    );
    const fresh = { weight: weight!, weightedFlux: weightedFlux!, nuisances };
    known.set(key, fresh);
    return fresh;
  };
}

function matchFamily(
  grid: Grid,
  family: Family,
  data: SearchData,
  transformsOf: (layout: LagLayout) => DataTransforms,
  options: MatchOptions,
  workspace: MatchWorkspace,
): Omit<FamilyMatch, 'correlations' | 'peaks'> {
  if (Math.abs(family.grid.step / grid.step - 1) > 1e-9) {
    throw new RangeError(`matchFamilies() family step must be ${grid.step}, got ${family.grid.step}`);
  }
  const range = lagsFor(grid.lnStart, family.grid, family.redshiftMin, family.redshiftMax);
  const layout = layOutLags(grid.length, range);
  const scan = scanFamily(
    family,
    data,
    transformsOf(layout),
    layout,
    range.lowest,
    options.leastCovered,
    workspace,
  );
  // Lags run against redshift.
  const curve = {
    kind: family.kind,
    lnStart: lnOnePlusRedshift(grid.lnStart, family.grid, range.lowest + range.lags - 1),
    step: grid.step,
    chiSquare: scan.chiSquare.reverse(),
  };
  const { minimaPerFamily, separationKmS } = options;
  return {
    ...curve,
    family,
    covered: scan.covered.reverse(),
    minima: deepestMinima(curve, minimaPerFamily[family.kind], separationKmS[family.kind]),
  };
}

/**
 * All minima and the clear correlation peaks in one list, each redshift of a refit set once: families of a set
 * share their components.
 */
function candidatesOf(matches: readonly FamilyMatch[], step: number, options: MatchOptions): Candidate[] {
  const all = matches.flatMap((match) => [
    ...match.minima.map((minimum) => candidateAt(match, minimum.redshift, 'chi-square', minimum)),
    ...match.peaks
      .filter((peak) => peak.r >= LEAST_R)
      .map((peak) => candidateAt(match, peak.redshift, 'correlation'))
      .filter((candidate) => Number.isFinite(candidate.chiSquare)),
  ]);
  all.sort((a, b) => a.chiSquare - b.chiSquare);
  const kept: Candidate[] = [];
  for (const candidate of all) {
    const { refitSet, kind } = candidate.family;
    const companions = kept.filter((other) => other.family.refitSet === refitSet);
    if (companions.length >= options.candidatesPerRefitSet[kind]) continue;
    const twin = companions.some(
      (other) => Math.abs(Math.log1p(other.redshift) - Math.log1p(candidate.redshift)) < TWIN_STEPS * step,
    );
    if (!twin) kept.push(candidate);
  }
  return kept;
}

function candidateAt(
  { family, lnStart, step, chiSquare, covered }: FamilyMatch,
  redshift: number,
  from: Candidate['from'],
  minimum?: Minimum,
): Candidate {
  const place = Math.round((Math.log1p(redshift) - lnStart) / step);
  const index = minimum?.index ?? Math.min(Math.max(place, 0), chiSquare.length - 1);
  return {
    family,
    redshift,
    chiSquare: minimum?.chiSquare ?? chiSquare[index]!,
    atEdge: minimum?.atEdge ?? false,
    covered: covered[index]!,
    from,
  };
}
