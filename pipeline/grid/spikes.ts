import { runningMedian } from '../core/running-median.ts';

/** A spike stands at least this many sigmas off its surroundings: below, fits are not led astray. */
const SPIKE_SIGMAS = 8;
/** Cosmic rays are up to this wide in extracted spectra. */
const WIDEST_SPIKE = 5;
/** Window of the surroundings' median: more than twice the widest spike, so that a spike is always a minority. */
const SURROUNDINGS = 2 * WIDEST_SPIKE + 3;
/** Window in which a real line is a minority: heights are measured from here, so that a wide line looks wide. */
const WIDE_SURROUNDINGS = 51;
/** An edge must beat the line spread by 2.5 sigmas of the difference of two pixels, and so must the other one. */
const EDGE_NOISE_SIGMAS = 2.5 * Math.SQRT2;
/** Stated line spreads are trusted to this factor: sharper by more is no line. */
const LINE_SPREAD_TRUST = 0.85;
/** Line spread where none is stated: the sharpest that is still sampled critically (2 pixels full width). */
const CRITICAL_SIGMA_PIXELS = 0.85;

/**
 * Finds isolated spikes: features at most 5 pixels wide whose two sides are both steeper than the line spread
 * allows. What is wide enough to be a line is never taken: a spectrograph cannot make a real line sharper.
 *
 * @param flux one arm; unusable pixels may be NaN
 * @param inverseVariance same length, 0 = unusable
 * @param sigmaPixels Gaussian sigma of the line spread at a pixel, in pixels; null = not known
 * @returns indices of the pixels to leave out (the spike and one neighbour each side), increasing
 */
export function findSpikes(
  flux: Float64Array,
  inverseVariance: Float64Array,
  sigmaPixels: ((pixel: number) => number) | null,
): number[] {
  const height = heightAbove(flux, inverseVariance, SURROUNDINGS);
  const wideHeight = heightAbove(flux, inverseVariance, WIDE_SURROUNDINGS);
  const found = new Set<number>();
  for (let i = 0; i < height.length; i++) {
    const sign = Math.sign(height[i]!);
    const peak = sign * height[i]!;
    if (peak < SPIKE_SIGMAS || !isLocalPeak(height, i, sign)) continue;
    const at = (j: number): number => (j < 0 || j >= height.length ? 0 : sign * height[j]!);
    let first = i;
    let last = i;
    while (at(first - 1) > 0.5 * peak) first--;
    while (at(last + 1) > 0.5 * peak) last++;
    if (last - first >= WIDEST_SPIKE) continue;
    const sigma = sigmaPixels === null ? CRITICAL_SIGMA_PIXELS : LINE_SPREAD_TRUST * sigmaPixels(i);
    // A line wider than the narrow window lifts its own surroundings; the wide one tells its true height.
    const whole = Math.max(peak, sign * wideHeight[i]!);
    const steepest = steepestEdge(sigma) + EDGE_NOISE_SIGMAS / whole;
    const leftEdge = (at(first) - at(first - 1)) / whole;
    const rightEdge = (at(last) - at(last + 1)) / whole;
    if (leftEdge <= steepest || rightEdge <= steepest) continue;
    for (let j = Math.max(0, first - 1); j <= Math.min(height.length - 1, last + 1); j++) found.add(j);
  }
  return [...found].sort((a, b) => a - b);
}

/** Flux above the running median, in sigmas; 0 where unusable. */
function heightAbove(flux: Float64Array, inverseVariance: Float64Array, window: number): Float64Array {
  const surroundings = runningMedian(flux, window, inverseVariance);
  return flux.map((f, i) =>
    inverseVariance[i]! > 0 ? (f - surroundings[i]!) * Math.sqrt(inverseVariance[i]!) : 0,
  );
}

function isLocalPeak(height: Float64Array, i: number, sign: number): boolean {
  const here = sign * height[i]!;
  return here >= sign * (height[i - 1] ?? 0) && here >= sign * (height[i + 1] ?? 0);
}

const edgeCache = new Map<number, number>();

/**
 * Largest drop from one pixel to the next, in units of the highest pixel, that a Gaussian line can show,
 * whatever its place within the pixel.
 *
 * @param sigma in pixels; rounded to 0.05
 */
export function steepestEdge(sigma: number): number {
  const key = Math.max(1, Math.round(sigma * 20));
  const known = edgeCache.get(key);
  if (known !== undefined) return known;
  const s = key / 20;
  const gaussian = (x: number): number => Math.exp(-0.5 * (x / s) ** 2);
  // Pixel means by Simpson's rule on quarters: exact to 1e-4 for s >= 0.5.
  const pixel = (x: number): number =>
    (gaussian(x - 0.5) +
      4 * gaussian(x - 0.25) +
      2 * gaussian(x) +
      4 * gaussian(x + 0.25) +
      gaussian(x + 0.5)) /
    12;
  let steepest = 0;
  for (let phase = 0; phase <= 0.5; phase += 0.05) {
    const highest = pixel(phase);
    for (let j = -1; j <= 2 * s + 1; j++) {
      steepest = Math.max(steepest, Math.abs(pixel(j + phase) - pixel(j + 1 + phase)) / highest);
    }
  }
  edgeCache.set(key, steepest);
  return steepest;
}
