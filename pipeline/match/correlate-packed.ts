import { fftOfSize } from '../core/fft.ts';
import type { VectorTransform } from './data-transforms.ts';
import type { Packed } from './family-transforms.ts';
import type { LagLayout } from './lag-layout.ts';

/**
 * Correlates one data vector with two template vectors at every lag of a layout: for entry `first` (`second`)
 * of the pair, Σ_i x[i] t[i + lag] goes to `into`, lag after lag.
 *
 * @param re,im scratch of layout.size
 * @param into called with the entry number; null = not wanted
 */
export function correlatePacked(
  data: VectorTransform,
  pair: Packed,
  layout: LagLayout,
  re: Float64Array,
  im: Float64Array,
  into: (entry: number) => Float64Array,
): void {
  const { size, segments, firstWanted, lags } = layout;
  let started = false;
  for (let s = 0; s < segments; s++) {
    const x = data[s];
    if (x === null || x === undefined) continue;
    const t = pair.chunks[s]!;
    if (started) addConjugateProduct(x.re, x.im, t.re, t.im, re, im, size);
    else conjugateProduct(x.re, x.im, t.re, t.im, re, im, size);
    started = true;
  }
  const first = into(pair.first);
  const second = pair.second < 0 ? null : into(pair.second);
  if (!started) {
    first.fill(0, 0, lags);
    second?.fill(0, 0, lags);
    return;
  }
  fftOfSize(size).inverse(re, im);
  for (let t = 0; t < lags; t++) first[t] = re[firstWanted + t]! / size;
  if (second !== null) for (let t = 0; t < lags; t++) second[t] = im[firstWanted + t]! / size;
}

function conjugateProduct(
  aRe: Float64Array,
  aIm: Float64Array,
  bRe: Float64Array,
  bIm: Float64Array,
  re: Float64Array,
  im: Float64Array,
  n: number,
): void {
  for (let k = 0; k < n; k++) {
    re[k] = aRe[k]! * bRe[k]! + aIm[k]! * bIm[k]!;
    im[k] = aRe[k]! * bIm[k]! - aIm[k]! * bRe[k]!;
  }
}

function addConjugateProduct(
  aRe: Float64Array,
  aIm: Float64Array,
  bRe: Float64Array,
  bIm: Float64Array,
  re: Float64Array,
  im: Float64Array,
  n: number,
): void {
  for (let k = 0; k < n; k++) {
    re[k] = re[k]! + aRe[k]! * bRe[k]! + aIm[k]! * bIm[k]!;
    im[k] = im[k]! + aRe[k]! * bIm[k]! - aIm[k]! * bRe[k]!;
  }
}
