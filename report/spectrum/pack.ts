import { deflateRawSync } from 'node:zlib';
import type { CurveArm, Curves } from '../../pipeline/weigh/answer.ts';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { SpectrumDetail } from '../../store/night-reader.ts';
import { lineMarks } from './line-marks.ts';
import type { ArmPayload, ScanPayload, SpectrumPayload } from './payload.ts';
import { EYE_LEVELS, FINE_LEVELS, quantise } from './quantise.ts';
import type { QuantisedSeries } from './quantise.ts';
import { thinIndexes } from './thin.ts';

/** More points than pixels a plot has across (about 900) cannot be seen before zooming in. */
const POINTS_PER_ARM = 1_200;
const POINTS_PER_SCAN = 600;

/** Candidates beyond the fifth are never within reach of the answer, and their marks would hide the curve. */
const CANDIDATES_MARKED = 5;

/**
 * Packs what the page needs to plot one spectrum: thinned, quantised, deflated.
 *
 * @returns null when its curves were not kept or hold no sample
 */
export function packSpectrum(row: CatalogueRow, detail: SpectrumDetail): SpectrumPayload | null {
  const curves = detail.curves;
  if (curves === null || curves.arms.every((arm) => arm.flux.length === 0)) return null;
  const pieces: Uint8Array[] = [];
  const keep = (series: QuantisedSeries): QuantisedSeries['range'] => {
    pieces.push(series.bytes);
    return series.range;
  };
  const arms = curves.arms.map((arm) => packArm(arm, keep));
  const scan = curves.scan.filter((one) => one.redshift.length > 0).map((one) => packScan(one, keep));
  const [from, to] = coverage(curves);
  return {
    arms,
    scan,
    marks: lineMarks(row, from, to),
    candidates: detail.candidates
      .slice(0, CANDIDATES_MARKED)
      .map(({ kind, redshift }) => ({ kind, redshift })),
    samples: deflateRawSync(Buffer.concat(pieces), { level: 9 }).toString('base64'),
  };
}

type Keep = (series: QuantisedSeries) => QuantisedSeries['range'];

function packArm(arm: CurveArm, keep: Keep): ArmPayload {
  const indexes = thinIndexes(arm.flux, POINTS_PER_ARM, arm.used);
  const take = (values: Float32Array): Float32Array => Float32Array.from(indexes, (i) => values[i]!);
  return {
    name: arm.name,
    length: indexes.length,
    wavelength: keep(quantise(take(arm.wavelengthVacuumAngstrom), FINE_LEVELS, false)),
    flux: keep(quantise(take(arm.flux), EYE_LEVELS, true)),
    error: keep(quantise(take(arm.error), EYE_LEVELS, true)),
    model: keep(quantise(take(arm.model), EYE_LEVELS, true)),
    runnerUp:
      arm.runnerUpModel.length === 0 ? null : keep(quantise(take(arm.runnerUpModel), EYE_LEVELS, true)),
    masked: maskedRanges(arm),
  };
}

function packScan(scan: Curves['scan'][number], keep: Keep): ScanPayload {
  const indexes = thinIndexes(scan.chiSquare, POINTS_PER_SCAN);
  const take = (values: Float32Array): Float32Array => Float32Array.from(indexes, (i) => values[i]!);
  return {
    kind: scan.kind,
    length: indexes.length,
    redshift: keep(quantise(take(scan.redshift), FINE_LEVELS, false)),
    chiSquare: keep(quantise(take(scan.chiSquare), FINE_LEVELS, false)),
  };
}

/** Runs of unused pixels, half a pixel wider on each side so that a single pixel has a width. */
function maskedRanges(arm: CurveArm): readonly (readonly [number, number])[] {
  const wavelength = arm.wavelengthVacuumAngstrom;
  const n = wavelength.length;
  const edge = (i: number, j: number): number => {
    const middle =
      (wavelength[Math.max(0, Math.min(n - 1, i))]! + wavelength[Math.max(0, Math.min(n - 1, j))]!) / 2;
    return Math.round(middle * 10) / 10;
  };
  const ranges: [number, number][] = [];
  for (let i = 0; i < n; i++) {
    if (arm.used[i] !== 0) continue;
    const first = i;
    while (i + 1 < n && arm.used[i + 1] === 0) i++;
    ranges.push([edge(first - 1, first), edge(i, i + 1)]);
  }
  return ranges;
}

function coverage(curves: Curves): [number, number] {
  let from = Infinity;
  let to = -Infinity;
  for (const { wavelengthVacuumAngstrom: wavelength } of curves.arms) {
    if (wavelength.length === 0) continue;
    from = Math.min(from, wavelength[0]!);
    to = Math.max(to, wavelength[wavelength.length - 1]!);
  }
  return [from, to];
}
