import { fftOfSize } from '../core/fft.ts';
import { parabolaVertex } from '../core/parabola.ts';
import { separatePair } from '../core/real-pair.ts';

/**
 * The normalised circular cross-correlation c(n) = Σ_m g(m) t(m − n) / (N σ_g σ_t), σ² = Σ g² / N
 * (Tonry & Davis 1979, AJ 84, 1511, section III.b).
 *
 * @param g,t equal length N, a power of two; continuum already removed
 * @returns c(0) .. c(N − 1); lag N − n stands for −n
 */
export function circularCorrelation(g: Float64Array, t: Float64Array): Float64Array {
  const size = g.length;
  const fft = fftOfSize(size);
  const re = g.slice();
  const im = t.slice();
  fft.forward(re, im);
  const parts = Array.from({ length: 4 }, () => new Float64Array(size));
  const [gRe, gIm, tRe, tIm] = parts as [Float64Array, Float64Array, Float64Array, Float64Array];
  separatePair(re, im, gRe, gIm, tRe, tIm);
  const square = (x: Float64Array): number => x.reduce((sum, v) => sum + v * v, 0);
  const norm = 1 / (size * Math.sqrt(square(g) * square(t)));
  for (let k = 0; k < size; k++) {
    re[k] = norm * (gRe[k]! * tRe[k]! + gIm[k]! * tIm[k]!);
    im[k] = norm * (gIm[k]! * tRe[k]! - gRe[k]! * tIm[k]!);
  }
  fft.inverse(re, im);
  return re;
}

/** One peak of a correlation function. */
export interface PeakStatistics {
  /** c at the peak's pixel. */
  readonly height: number;
  /** Rms of the antisymmetric part about the peak. */
  readonly antisymmetricSigma: number;
  /** Tonry & Davis 1979: height / (√2 antisymmetricSigma). */
  readonly r: number;
  /** Vertex of the parabola through the peak, pixels from the peak. */
  readonly offset: number;
  /** Full width at half height, linear between pixels; NaN when the function does not fall to half in reach. */
  readonly fullWidth: number;
  /** 1-sigma of the peak's place, pixels: (3/8) w / (1 + r) (Kurtz & Mink 1998, PASP 110, 934). */
  readonly error: number;
}

/**
 * Height, r and error of a correlation peak.
 *
 * @param at the correlation at any whole lag within reach of the peak
 * @param peak lag of the highest pixel
 * @param reach lags on each side that count; N / 2 for a circular correlation of N
 */
export function peakStatistics(at: (lag: number) => number, peak: number, reach: number): PeakStatistics {
  const height = at(peak);
  // σ_a² = (1 / 2N) Σ_n [c(δ+n) − c(δ−n)]² over all N lags; n and −n give the same term, hence N = 2 reach.
  let sum = 0;
  for (let n = 1; n <= reach; n++) sum += (at(peak + n) - at(peak - n)) ** 2;
  const antisymmetricSigma = Math.sqrt(sum / (2 * reach));
  const r = height / (Math.SQRT2 * antisymmetricSigma);
  const fullWidth = halfWidth(at, peak, 1, reach) + halfWidth(at, peak, -1, reach);
  return {
    height,
    antisymmetricSigma,
    r,
    offset: parabolaVertex(at(peak - 1), height, at(peak + 1))?.offset ?? 0,
    fullWidth,
    error: (0.375 * fullWidth) / (1 + r),
  };
}

/** Distance from the peak to the first crossing of half height in one direction. */
function halfWidth(at: (lag: number) => number, peak: number, direction: 1 | -1, reach: number): number {
  const half = 0.5 * at(peak);
  for (let n = 1; n <= reach; n++) {
    const here = at(peak + direction * n);
    if (here > half) continue;
    const before = at(peak + direction * (n - 1));
    return n - 1 + (before - half) / (before - here);
  }
  return NaN;
}
