import type { Family } from '../../templates/family.ts';
import type { Grid } from '../grid/grid.ts';
import { correlateFamily, type FeatureTransforms } from './correlate-family.ts';
import { type PeakStatistics, peakStatistics } from './correlation-peak.ts';
import { transformVectors } from './data-transforms.ts';
import { CONTINUUM_PIXELS, type Features, spectrumFeatures } from './features.ts';
import { type LagLayout, lagsFor, layOutLags, lnOnePlusRedshift } from './lag-layout.ts';
import type { MatchOptions } from './match-options.ts';
import { deepestMinima } from './minima.ts';
import type { MatchWorkspace } from './workspace.ts';

/** Lags beyond the family's range that the noise of the correlation is measured on. */
const MARGIN = 512;
/** With fewer lags on each side the noise of the correlation, hence r, is not known. */
const LEAST_REACH = 100;
/** A peak is looked for this many pixels around a given redshift: the fit and the correlation differ by noise. */
const PEAK_REACH = 3;

/** Cross-correlation of a spectrum with one spectrum of a family, against redshift. */
export interface CorrelationCurve {
  readonly family: Family;
  /** ln(1+z) of entry 0. */
  readonly lnStart: number;
  readonly step: number;
  /** −1 .. 1; NaN where the family covers too little. */
  readonly values: Float64Array;
  /** Entries within the family's redshift range; the others only serve the noise. */
  readonly first: number;
  readonly end: number;
}

/** A peak of the cross-correlation. */
export interface CorrelationPeak extends PeakStatistics {
  readonly redshift: number;
  readonly family: Family;
}

/** A function that correlates one spectrum with a family; what depends on the spectrum alone is done once. */
export function correlationSearch(
  grid: Grid,
  options: MatchOptions,
  workspace: MatchWorkspace,
): (family: Family) => CorrelationCurve[] {
  const featuresByWidth = new Map<number, Features>();
  const transformsByLayout = new Map<string, FeatureTransforms>();
  const featuresOf = (width: number): Features => {
    const features = featuresByWidth.get(width) ?? spectrumFeatures(grid, width, options.mismatch);
    featuresByWidth.set(width, features);
    return features;
  };
  const transformsOf = (width: number, layout: LagLayout): FeatureTransforms => {
    const key = `${width} ${layout.size} ${layout.segment}`;
    let transforms = transformsByLayout.get(key);
    if (transforms === undefined) {
      const { values, weight } = featuresOf(width);
      const weighted = values.map((v, i) => v * weight[i]!);
      const [weightedFeatures, weights] = transformVectors(
        [
          { offset: 0, values: weighted },
          { offset: 0, values: weight },
        ],
        layout,
        workspace,
        `features ${width}`,
      );
      transforms = { weightedFeatures: weightedFeatures!, weight: weights! };
      transformsByLayout.set(key, transforms);
    }
    return transforms;
  };
  return (family) => {
    const width = CONTINUUM_PIXELS[family.kind];
    const wanted = lagsFor(grid.lnStart, family.grid, family.redshiftMin, family.redshiftMax);
    if (wanted.lags === 0) return [];
    const range = { lowest: wanted.lowest - MARGIN, lags: wanted.lags + 2 * MARGIN };
    const layout = layOutLags(grid.length, range);
    const rows = correlateFamily(
      family,
      featuresOf(width),
      transformsOf(width, layout),
      layout,
      range.lowest,
      options.leastCovered,
      workspace,
    );
    return rows.map((values) => ({
      family,
      // Lags run against redshift.
      lnStart: lnOnePlusRedshift(grid.lnStart, family.grid, range.lowest + range.lags - 1),
      step: grid.step,
      values: values.reverse(),
      first: MARGIN,
      end: MARGIN + wanted.lags,
    }));
  };
}

/** The highest separate peaks of a curve within the family's range, highest first. */
export function highestPeaks(
  curve: CorrelationCurve,
  count: number,
  separationKmS: number,
): CorrelationPeak[] {
  const upsideDown = {
    kind: curve.family.kind,
    lnStart: curve.lnStart + curve.first * curve.step,
    step: curve.step,
    chiSquare: curve.values.subarray(curve.first, curve.end).map((v) => -v),
  };
  return deepestMinima(upsideDown, count, separationKmS).map(({ index }) =>
    peakAt(curve, curve.first + index),
  );
}

/**
 * Height and r of the correlation at a redshift: of the highest point within 3 pixels.
 *
 * @param curves of one family
 * @returns null when the redshift is outside every curve or too little is covered; r is NaN when fewer than 100
 *   lags on each side show the noise of the correlation
 */
export function correlationAt(curves: readonly CorrelationCurve[], redshift: number): CorrelationPeak | null {
  let best: CorrelationPeak | null = null;
  for (const curve of curves) {
    const place = Math.round((Math.log1p(redshift) - curve.lnStart) / curve.step);
    if (!(place >= curve.first - PEAK_REACH && place < curve.end + PEAK_REACH)) continue;
    let highest = -1;
    for (let i = Math.max(0, place - PEAK_REACH); i <= place + PEAK_REACH; i++) {
      if (Number.isFinite(curve.values[i]) && !(curve.values[i]! <= curve.values[highest]!)) highest = i;
    }
    if (highest < 0) continue;
    if (best === null || curve.values[highest]! > best.height) best = peakAt(curve, highest);
  }
  return best;
}

function peakAt(curve: CorrelationCurve, place: number): CorrelationPeak {
  const { values, lnStart, step, family } = curve;
  let reach = 0;
  while (reach < MARGIN && Number.isFinite(values[place - reach - 1]! + values[place + reach + 1]!)) reach++;
  const statistics = peakStatistics((i) => values[i]!, place, reach);
  const r = reach < LEAST_REACH ? NaN : statistics.r;
  return { ...statistics, r, family, redshift: Math.expm1(lnStart + (place + statistics.offset) * step) };
}
