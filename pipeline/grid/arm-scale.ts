/** An arm on the common axis in its own flux unit. */
export interface UnscaledArm {
  readonly offset: number;
  readonly flux: Float64Array;
  readonly weight: Float64Array;
}

/** The overlap must show both arms at this signal-to-noise, else the ratio would add noise, not remove a step. */
const LEAST_SIGNAL_TO_NOISE = 10;
/** Arms of one spectrograph never disagree by more; a larger ratio means the overlap is bad. */
const LARGEST_RATIO = 3;

/**
 * Factor that brings `arm` to the level of `reference` from the pixels both have: ratio of their weighted sums.
 *
 * @returns 1 when they do not overlap, when the overlap is too faint to tell, or when the ratio is absurd
 */
export function scaleToReference(reference: UnscaledArm, arm: UnscaledArm): number {
  let sumReference = 0;
  let sumArm = 0;
  let varianceReference = 0;
  let varianceArm = 0;
  const first = Math.max(reference.offset, arm.offset);
  const end = Math.min(reference.offset + reference.flux.length, arm.offset + arm.flux.length);
  for (let i = first; i < end; i++) {
    const a = reference.weight[i - reference.offset]!;
    const b = arm.weight[i - arm.offset]!;
    if (!(a > 0 && b > 0)) continue;
    const w = 1 / (1 / a + 1 / b);
    sumReference += w * reference.flux[i - reference.offset]!;
    sumArm += w * arm.flux[i - arm.offset]!;
    varianceReference += (w * w) / a;
    varianceArm += (w * w) / b;
  }
  const clear = (sum: number, variance: number): boolean => sum > LEAST_SIGNAL_TO_NOISE * Math.sqrt(variance);
  if (!clear(sumReference, varianceReference) || !clear(sumArm, varianceArm)) return 1;
  const ratio = sumReference / sumArm;
  return ratio > LARGEST_RATIO || ratio < 1 / LARGEST_RATIO ? 1 : ratio;
}
