import type { SeriesRange } from './payload.ts';

/** The code of a missing sample, above every level. */
export const MISSING_CODE = 0xffff;

/** Levels where position matters: wavelength and redshift. 6,000 A / 65,534 = 0.09 A. */
export const FINE_LEVELS = 65_534;
/** Levels where the eye judges: with the range clipped below, a step stays under a fortieth of the noise. */
export const EYE_LEVELS = 4_095;

/** Values further out than this many times the central spread are drawn at the edge. */
const CLIP_SPREADS = 20;
const CENTRAL_LOW = 0.02;
const CENTRAL_HIGH = 0.98;

/** A quantised series: its range and its bytes. */
export interface QuantisedSeries {
  readonly range: SeriesRange;
  readonly bytes: Uint8Array;
}

/**
 * Rounds a series to `levels` equal steps and lays it out so that deflate finds its smoothness: differences of
 * neighbours modulo 2^16, all high bytes first, then all low bytes. Not finite = missing.
 *
 * @param clip true: the range is cut where single outliers (cosmic rays) would spoil the steps for all others
 */
export function quantise(values: ArrayLike<number>, levels: number, clip: boolean): QuantisedSeries {
  const [from, to] = rangeOf(values, clip);
  const n = values.length;
  const bytes = new Uint8Array(2 * n);
  let before = 0;
  for (let i = 0; i < n; i++) {
    const value = values[i]!;
    const share = to > from ? (Math.min(to, Math.max(from, value)) - from) / (to - from) : 0;
    const code = Number.isFinite(value) ? Math.round(share * levels) : MISSING_CODE;
    const difference = (code - before) & 0xffff;
    bytes[i] = difference >> 8;
    bytes[n + i] = difference & 0xff;
    before = code;
  }
  return { range: { from, to, levels }, bytes };
}

function rangeOf(values: ArrayLike<number>, clip: boolean): [number, number] {
  const sorted = Float64Array.from(Array.from(values).filter((value) => Number.isFinite(value))).sort();
  if (sorted.length === 0) return [0, 0];
  const at = (share: number): number => sorted[Math.round(share * (sorted.length - 1))]!;
  const lowest = at(0);
  const highest = at(1);
  if (!clip) return [lowest, highest];
  const spread = at(CENTRAL_HIGH) - at(CENTRAL_LOW);
  return [
    Math.max(lowest, at(CENTRAL_LOW) - CLIP_SPREADS * spread),
    Math.min(highest, at(CENTRAL_HIGH) + CLIP_SPREADS * spread),
  ];
}
