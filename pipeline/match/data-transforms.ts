import { fftOfSize } from '../core/fft.ts';
import { separatePair } from '../core/real-pair.ts';
import type { LagLayout } from './lag-layout.ts';
import { type MatchWorkspace, scratch } from './workspace.ts';

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

/**
 * Transforms of several real vectors, two at a time, in the segments of a layout.
 *
 * @param purpose names the arrays in the workspace: the result is good until the next call for the same purpose
 *   and layout
 */
export function transformVectors(
  vectors: readonly PlacedVector[],
  layout: LagLayout,
  workspace: MatchWorkspace,
  purpose: string,
): VectorTransform[] {
  const { size, segment, segments } = layout;
  const fft = fftOfSize(size);
  const re = scratch(workspace, 're', size).subarray(0, size);
  const im = scratch(workspace, 'im', size).subarray(0, size);
  const out = vectors.map((): (SegmentTransform | null)[] =>
    new Array<SegmentTransform | null>(segments).fill(null),
  );
  const roomFor = (v: number, s: number): SegmentTransform => {
    const name = `${purpose} ${size} ${segment} ${v} ${s}`;
    return { re: scratch(workspace, `${name} re`, size), im: scratch(workspace, `${name} im`, size) };
  };
  for (let v = 0; v < vectors.length; v += 2) {
    for (let s = 0; s < segments; s++) {
      const first = copySegment(vectors[v]!, s * segment, segment, re);
      const second = v + 1 < vectors.length && copySegment(vectors[v + 1]!, s * segment, segment, im);
      if (!first && !second) continue;
      if (!second) im.fill(0);
      fft.forward(re, im);
      const a = roomFor(v, s);
      const b = roomFor(v + 1, s);
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
