/**
 * The usable native pixels of one spectrum, laid end to end for the refit. Every array has `count` entries;
 * arm a owns entries arms[a].first .. arms[a].end - 1 (none when it has no usable pixel), in increasing
 * wavelength.
 */
export interface RefitPixels {
  readonly count: number;
  readonly arms: readonly PixelRange[];
  /** Natural logarithm of the pixel's lower and upper edge, vacuum ångström, observed frame. */
  readonly lnLow: Float64Array;
  readonly lnHigh: Float64Array;
  /** Flux over `fluxScale`, so that amplitudes are of order one. */
  readonly flux: Float64Array;
  /** 1 / (noise variance + mismatch variance), in 1/(scaled flux)². */
  readonly weight: Float64Array;
  /** Position inside the arm, -1 .. 1, the argument of the Legendre polynomials. */
  readonly place: Float64Array;
  readonly fluxScale: number;
  /** Index of each entry in its arm's own native arrays. */
  readonly nativeIndex: Int32Array;
}

export interface PixelRange {
  readonly first: number;
  readonly end: number;
}

/** One arm as the refit needs it: native arrays of equal length, and which pixels may be used. */
export interface NativeArm {
  readonly wavelengthVacuumAngstrom: Float64Array;
  readonly flux: Float64Array;
  /** 1/sigma² after the noise check; 0 = not used. */
  readonly inverseVariance: Float64Array;
  /** Smooth flux level of each pixel, for the mismatch term. */
  readonly level: Float64Array;
}

/**
 * Lays the usable pixels of all arms end to end.
 *
 * @param mismatch relative 1-sigma mismatch between templates and real objects: variance gains
 *   (mismatch × level)², the one model-error term of the measurement
 * @throws RangeError when no pixel is usable
 */
export function refitPixels(arms: readonly NativeArm[], mismatch: number): RefitPixels {
  const counts = arms.map((arm) => arm.inverseVariance.reduce((n, w) => (w > 0 ? n + 1 : n), 0));
  const count = counts.reduce((sum, n) => sum + n, 0);
  if (count === 0) throw new RangeError('refitPixels() needs at least one usable pixel, got 0');
  const fluxScale = rmsFlux(arms, count);
  const pixels = {
    count,
    arms: [] as PixelRange[],
    lnLow: new Float64Array(count),
    lnHigh: new Float64Array(count),
    flux: new Float64Array(count),
    weight: new Float64Array(count),
    place: new Float64Array(count),
    fluxScale,
    nativeIndex: new Int32Array(count),
  };
  let next = 0;
  for (const arm of arms) {
    const first = next;
    next = layArm(arm, mismatch, pixels, first);
    pixels.arms.push({ first, end: next });
  }
  return pixels;
}

function rmsFlux(arms: readonly NativeArm[], count: number): number {
  let sum = 0;
  for (const arm of arms) {
    for (let i = 0; i < arm.flux.length; i++) if (arm.inverseVariance[i]! > 0) sum += arm.flux[i]! ** 2;
  }
  return sum > 0 ? Math.sqrt(sum / count) : 1;
}

function layArm(arm: NativeArm, mismatch: number, into: RefitPixels, first: number): number {
  const lambda = arm.wavelengthVacuumAngstrom;
  const n = lambda.length;
  const lnFirst = Math.log(lambda[0]!);
  const lnSpan = Math.max(Math.log(lambda[n - 1]!) - lnFirst, 1e-9);
  let k = first;
  for (let i = 0; i < n; i++) {
    const w = arm.inverseVariance[i]!;
    if (!(w > 0)) continue;
    // Edges halfway to the neighbours; the outermost pixels are as wide as the one inside them.
    const below = i > 0 ? lambda[i - 1]! : 2 * lambda[0]! - lambda[1]!;
    const above = i < n - 1 ? lambda[i + 1]! : 2 * lambda[n - 1]! - lambda[n - 2]!;
    into.lnLow[k] = Math.log(0.5 * (below + lambda[i]!));
    into.lnHigh[k] = Math.log(0.5 * (above + lambda[i]!));
    into.flux[k] = arm.flux[i]! / into.fluxScale;
    into.weight[k] = into.fluxScale ** 2 / (1 / w + (mismatch * arm.level[i]!) ** 2);
    into.place[k] = (2 * (Math.log(lambda[i]!) - lnFirst)) / lnSpan - 1;
    into.nativeIndex[k] = i;
    k++;
  }
  return k;
}
