import type { Family, Kind } from '../../templates/family.ts';
import { lowPass } from '../core/low-pass.ts';
import { boxSmooth } from '../core/smooth.ts';
import { cosineBell } from '../core/taper.ts';
import type { Grid } from '../grid/grid.ts';
import { smoothLevel } from '../grid/level.ts';

/** Width of the continuum's moving mean, pixels: wide against the kind's lines (10,000 and 28,000 km/s). */
export const CONTINUUM_PIXELS: Readonly<Record<Kind, number>> = { star: 151, galaxy: 151, quasar: 401 };
/** Structure finer than the line spread is noise: cut between these periods, pixels (Brault & White 1971). */
const KEPT_PERIOD = 5;
const LOST_PERIOD = 2.5;
/** Part of the spectrum tapered at each end: 5 per cent, common practice. */
const TAPER = 0.05;
/** Window of the level in the mismatch term, pixels, as everywhere on the grid. */
const LEVEL_PIXELS = 51;
/** A row that is zero over more than this part is made of emission lines. */
const SPARSE = 0.5;

/** A spectrum without its continuum, as the correlation weighs it. */
export interface Features {
  readonly values: Float64Array;
  /** Taper × inverse variance, arbitrary scale; 0 = no say. */
  readonly weight: Float64Array;
}

/** Features of a spectrum's joined arms, continuum removed over the given width. */
export function spectrumFeatures(grid: Grid, continuumPixels: number, mismatch: number): Features {
  const { flux, weight } = grid.joined;
  const level = smoothLevel(flux, weight, LEVEL_PIXELS);
  const total = Float64Array.from(weight, (w, i) => (w > 0 ? 1 / (1 / w + (mismatch * level[i]!) ** 2) : 0));
  const scale = Math.max(...[...grid.arms].map((arm) => rms(arm.flux))) || 1;
  const bell = cosineBell(grid.length, TAPER);
  const residual = withoutContinuum(
    flux.map((f) => f / scale),
    continuumPixels,
    total.map((w) => w * scale * scale),
  );
  return {
    values: lowPass(residual, KEPT_PERIOD, LOST_PERIOD),
    weight: total.map((w, i) => w * scale * scale * bell[i]!),
  };
}

function rms(values: Float64Array): number {
  return Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
}

/** Values minus their moving mean, taken twice for a smooth kernel; 0 where there is no weight. */
function withoutContinuum(values: Float64Array, width: number, weight: Float64Array): Float64Array {
  const once = boxSmooth(values, width, weight);
  const twice = boxSmooth(once, width, weight);
  return values.map((v, i) => (weight[i]! > 0 ? v - twice[i]! : 0));
}

/**
 * The spectra of a family that the correlation uses: the leading row (the mean spectrum, turned upright), and
 * the sum of the emission-line rows where there are any.
 */
export function correlationRows(family: Family): Float64Array[] {
  const width = CONTINUUM_PIXELS[family.kind];
  const sparse = family.basis.filter(
    (row) => row.reduce((n, v) => n + (v === 0 ? 1 : 0), 0) > SPARSE * row.length,
  );
  const leading = upright(Float64Array.from(family.basis[0]!));
  const whole = new Float64Array(leading.length).fill(1);
  const rows = [lowPass(withoutContinuum(leading, width, whole), KEPT_PERIOD, LOST_PERIOD)];
  if (sparse.length > 0) {
    const sum = new Float64Array(leading.length);
    for (const row of sparse) upright(Float64Array.from(row)).forEach((v, i) => (sum[i] = sum[i]! + v));
    rows.push(lowPass(withoutContinuum(sum, width, whole), KEPT_PERIOD, LOST_PERIOD));
  }
  return rows;
}

function upright(row: Float64Array): Float64Array {
  return row.reduce((sum, v) => sum + v, 0) < 0 ? row.map((v) => -v) : row;
}
