import { fftOfSize } from './fft.ts';
import { separatePair } from './real-pair.ts';

/** Smallest power of two that is >= n, and at least 2. */
export function powerOfTwoFor(n: number): number {
  let size = 2;
  while (size < n) size *= 2;
  return size;
}

/**
 * Correlation of two real arrays at every lag at which they overlap, by one forward and one inverse transform.
 *
 * The obvious form: c(s) = Σ_i a[i] · b[i + s], with zero outside the arrays.
 *
 * @returns length a.length + b.length − 1; entry j belongs to lag s = j − (a.length − 1)
 */
export function correlateReal(a: ArrayLike<number>, b: ArrayLike<number>): Float64Array {
  const lags = a.length + b.length - 1;
  const fft = fftOfSize(powerOfTwoFor(lags));
  const re = new Float64Array(fft.size);
  const im = new Float64Array(fft.size);
  for (let i = 0; i < a.length; i++) re[i] = a[i]!;
  for (let i = 0; i < b.length; i++) im[i] = b[i]!;
  fft.forward(re, im);
  const aRe = new Float64Array(fft.size);
  const aIm = new Float64Array(fft.size);
  const bRe = new Float64Array(fft.size);
  const bIm = new Float64Array(fft.size);
  separatePair(re, im, aRe, aIm, bRe, bIm);
  for (let k = 0; k < fft.size; k++) {
    re[k] = (aRe[k]! * bRe[k]! + aIm[k]! * bIm[k]!) / fft.size;
    im[k] = (aRe[k]! * bIm[k]! - aIm[k]! * bRe[k]!) / fft.size;
  }
  fft.inverse(re, im);
  const out = new Float64Array(lags);
  for (let j = 0; j < lags; j++) out[j] = re[(j - (a.length - 1) + fft.size) % fft.size]!;
  return out;
}
