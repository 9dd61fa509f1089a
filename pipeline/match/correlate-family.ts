import type { Family } from '../../templates/family.ts';
import { fftOfSize } from '../core/fft.ts';
import { separatePair } from '../core/real-pair.ts';
import type { SegmentTransform, VectorTransform } from './data-transforms.ts';
import { correlationRows, type Features } from './features.ts';
import type { LagLayout } from './lag-layout.ts';
import { type MatchWorkspace, scratch } from './workspace.ts';

/** Transforms of a data segment's weighted features and of its weights. */
export interface FeatureTransforms {
  readonly weightedFeatures: VectorTransform;
  readonly weight: VectorTransform;
}

interface RowChunk {
  readonly row: SegmentTransform;
  readonly square: SegmentTransform;
}

const cache = new WeakMap<Family, { rows: readonly Float64Array[]; chunks: Map<string, RowChunk> }>();
/** Chunks kept per family: beyond it the night holds spectra of too many shapes to remember. */
const KEPT_CHUNKS = 64;

/**
 * Normalised cross-correlation of a spectrum's features with each correlation row of a family, at every lag:
 * c(s) = Σ u g t(s) / √(Σ u g² · Σ u t(s)²), sums over the pixels the family covers, u the weights. With equal
 * weights and full cover this is the c of Tonry & Davis (1979).
 *
 * @param lowestLag template pixel − data pixel at output place 0
 * @param leastCovered part of the weight below which c is NaN
 * @returns per row, values between −1 and 1, lowest lag first
 */
export function correlateFamily(
  family: Family,
  features: Features,
  transforms: FeatureTransforms,
  layout: LagLayout,
  lowestLag: number,
  leastCovered: number,
  workspace: MatchWorkspace,
): Float64Array[] {
  let known = cache.get(family);
  if (known === undefined) {
    known = { rows: correlationRows(family), chunks: new Map() };
    cache.set(family, known);
  }
  const { rows, chunks } = known;
  if (chunks.size > KEPT_CHUNKS) chunks.clear();
  const sums = coverSums(features);
  const re = scratch(workspace, 're', layout.size).subarray(0, layout.size);
  const im = scratch(workspace, 'im', layout.size).subarray(0, layout.size);
  return rows.map((row, number) => {
    re.fill(0);
    im.fill(0);
    for (let s = 0; s < layout.segments; s++) {
      const start = layout.firstLag + s * layout.segment;
      const key = `${number} ${layout.size} ${start}`;
      let chunk = chunks.get(key);
      if (chunk === undefined) {
        chunk = transformRow(row, start, layout.size);
        chunks.set(key, chunk);
      }
      const weighted = transforms.weightedFeatures[s];
      const weight = transforms.weight[s];
      if (weighted && weight) addBothProducts(weighted, weight, chunk, re, im);
    }
    fftOfSize(layout.size).inverse(re, im);
    return normalise(re, im, sums, layout, lowestLag, row.length, leastCovered);
  });
}

/** Adds conj(x)·row + i conj(u)·square: one inverse transform then gives Σ x t and Σ u t² together. */
function addBothProducts(
  x: SegmentTransform,
  u: SegmentTransform,
  { row, square }: RowChunk,
  re: Float64Array,
  im: Float64Array,
): void {
  for (let k = 0; k < re.length; k++) {
    const uRe = u.re[k]! * square.re[k]! + u.im[k]! * square.im[k]!;
    const uIm = u.re[k]! * square.im[k]! - u.im[k]! * square.re[k]!;
    re[k] = re[k]! + x.re[k]! * row.re[k]! + x.im[k]! * row.im[k]! - uIm;
    im[k] = im[k]! + x.re[k]! * row.im[k]! - x.im[k]! * row.re[k]! + uRe;
  }
}

function transformRow(row: Float64Array, start: number, size: number): RowChunk {
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let i = Math.max(0, start); i < Math.min(start + size, row.length); i++) {
    re[i - start] = row[i]!;
    im[i - start] = row[i]! ** 2;
  }
  fftOfSize(size).forward(re, im);
  const fresh = (): SegmentTransform => ({ re: new Float64Array(size), im: new Float64Array(size) });
  const chunk = { row: fresh(), square: fresh() };
  separatePair(re, im, chunk.row.re, chunk.row.im, chunk.square.re, chunk.square.im);
  return chunk;
}

/** Running sums of u and u g², starting with 0. */
function coverSums({ values, weight }: Features): { weight: Float64Array; square: Float64Array } {
  const sums = { weight: new Float64Array(values.length + 1), square: new Float64Array(values.length + 1) };
  for (let i = 0; i < values.length; i++) {
    sums.weight[i + 1] = sums.weight[i]! + weight[i]!;
    sums.square[i + 1] = sums.square[i]! + weight[i]! * values[i]! ** 2;
  }
  return sums;
}

function normalise(
  products: Float64Array,
  squares: Float64Array,
  sums: { weight: Float64Array; square: Float64Array },
  layout: LagLayout,
  lowestLag: number,
  rowLength: number,
  leastCovered: number,
): Float64Array {
  const dataLength = sums.weight.length - 1;
  const total = sums.weight[dataLength]!;
  const out = new Float64Array(layout.lags).fill(NaN);
  for (let t = 0; t < layout.lags; t++) {
    const lag = lowestLag + t;
    const first = Math.min(Math.max(0, -lag), dataLength);
    const end = Math.max(first, Math.min(dataLength, rowLength - lag));
    if (sums.weight[end]! - sums.weight[first]! < leastCovered * total) continue;
    const at = layout.firstWanted + t;
    const norm = (sums.square[end]! - sums.square[first]!) * (squares[at]! / layout.size);
    if (norm > 0) out[t] = products[at]! / layout.size / Math.sqrt(norm);
  }
  return out;
}
