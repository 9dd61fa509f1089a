import type { LogGrid } from '../../templates/family.ts';

/**
 * How the correlations of one family are cut into transforms of equal size. Data segment s holds pixels
 * s × segment .. ; the template chunk beside it starts at firstLag + s × segment. Correlations of all segments
 * are added before one inverse transform, so few lags cost small transforms (overlap-save).
 */
export interface LagLayout {
  /** Size of the transforms. */
  readonly size: number;
  /** Data pixels per transform. */
  readonly segment: number;
  readonly segments: number;
  /** Lag of output place 0: template pixel = data pixel + lag. A multiple of size / 16, so that spectra share it. */
  readonly firstLag: number;
  /** Output places that hold wanted lags: firstWanted .. firstWanted + lags − 1. */
  readonly firstWanted: number;
  readonly lags: number;
}

/** Smallest and largest transform considered. */
const SMALLEST = 128;
const LARGEST = 32768;
/** Time of one multiply-and-add pass over a transform, in units of one of its log2(size) passes. */
const MULTIPLY_COST = 2;

/** Lags (template pixel − data pixel) that bring a redshift range to a family's grid; empty when lags is 0. */
export interface LagRange {
  readonly lowest: number;
  readonly lags: number;
}

/**
 * Lags of a redshift range: ln(1+z) = dataLnStart − familyLnStart − lag × step.
 *
 * @param dataLnStart ln(wavelength) of data pixel 0, observed
 */
export function lagsFor(
  dataLnStart: number,
  grid: LogGrid,
  redshiftMin: number,
  redshiftMax: number,
): LagRange {
  const origin = (dataLnStart - grid.lnStart) / grid.step;
  const lowest = Math.ceil(origin - Math.log1p(redshiftMax) / grid.step - 1e-6);
  const highest = Math.floor(origin - Math.log1p(redshiftMin) / grid.step + 1e-6);
  return { lowest, lags: Math.max(0, highest - lowest + 1) };
}

/** ln(1+z) at a lag, which need not be whole. */
export function lnOnePlusRedshift(dataLnStart: number, grid: LogGrid, lag: number): number {
  return dataLnStart - grid.lnStart - lag * grid.step;
}

/** The cheapest layout for a number of data pixels and lags. */
export function layOutLags(dataLength: number, range: LagRange): LagLayout {
  let best: LagLayout | null = null;
  let bestCost = Infinity;
  for (let size = SMALLEST; size <= LARGEST; size *= 2) {
    const grain = size / 16;
    const firstLag = Math.floor(range.lowest / grain) * grain;
    // One grain more than needed: the layout then holds for every start within a grain.
    const segment = Math.floor((size - range.lags - grain + 2) / grain) * grain;
    if (segment <= 0) continue;
    const segments = Math.ceil(dataLength / segment);
    const cost = size * (Math.log2(size) + MULTIPLY_COST * segments);
    if (cost >= bestCost) continue;
    bestCost = cost;
    best = { size, segment, segments, firstLag, firstWanted: range.lowest - firstLag, lags: range.lags };
  }
  if (best === null) {
    throw new RangeError(`layOutLags() must be given fewer lags than ${LARGEST}, got ${range.lags}`);
  }
  return best;
}
