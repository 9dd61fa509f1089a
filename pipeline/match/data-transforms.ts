import { fftOfSize } from '../core/fft.ts';
import { separatePair } from '../core/real-pair.ts';
import type { LagLayout } from './lag-layout.ts';

/** Transform of one real vector of the data, segment after segment; null where the segment is all zeros. */
export type VectorTransform = readonly (SegmentTransform | null)[];

export interface SegmentTransform {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** A vector on the common axis: zero outside offset .. offset + values.length − 1. */
export interface PlacedVector {
  readonly offset: number;
  readonly values: Float64Array;
}

/** Transforms of several real vectors, two at a time, in the segments of a layout. */
export function transformVectors(vectors: readonly PlacedVector[], layout: LagLayout): VectorTransform[] {
  const { size, segment, segments } = layout;
  const fft = fftOfSize(size);
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  const out = vectors.map((): (SegmentTransform | null)[] =>
    new Array<SegmentTransform | null>(segments).fill(null),
  );
  for (let v = 0; v < vectors.length; v += 2) {
    for (let s = 0; s < segments; s++) {
      const first = copySegment(vectors[v]!, s * segment, segment, re);
      const second = v + 1 < vectors.length && copySegment(vectors[v + 1]!, s * segment, segment, im);
      if (!first && !second) continue;
      if (!second) im.fill(0);
      fft.forward(re, im);
      const a = { re: new Float64Array(size), im: new Float64Array(size) };
      const b = { re: new Float64Array(size), im: new Float64Array(size) };
      separatePair(re, im, a.re, a.im, b.re, b.im);
      if (first) out[v]![s] = a;
      if (second) out[v + 1]![s] = b;
    }
  }
  return out;
}

/** Writes one segment, zero-padded, into `into`; false when it is all zeros. */
function copySegment(vector: PlacedVector, start: number, length: number, into: Float64Array): boolean {
  into.fill(0);
  let any = false;
  const from = Math.max(start, vector.offset);
  const to = Math.min(start + length, vector.offset + vector.values.length);
  for (let i = from; i < to; i++) {
    const value = vector.values[i - vector.offset]!;
    into[i - start] = value;
    if (value !== 0) any = true;
  }
  return any;
}
