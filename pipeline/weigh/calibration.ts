import type { Kind } from '../../templates/family.ts';

/** A logistic map from features to the probability of being right, one row of weights per kind. */
export interface Calibration {
  /** Names the data it was fitted on; goes into the catalogue. */
  readonly id: string;
  readonly kinds: Readonly<
    Record<Kind, { readonly constant: number; readonly weights: Readonly<Record<string, number>> }>
  >;
}

/**
 * P(right) = 1 / (1 + exp(−(constant + Σ weight × feature))), Platt 1999 with several features.
 *
 * @throws RangeError when a feature the calibration needs is missing
 */
export function calibrated(
  calibration: Calibration,
  kind: Kind,
  features: Readonly<Record<string, number>>,
): number {
  const { constant, weights } = calibration.kinds[kind];
  let sum = constant;
  for (const [name, weight] of Object.entries(weights)) {
    const value = features[name];
    if (value === undefined)
      throw new RangeError(`calibration ${calibration.id} needs the feature ${name}, got none`);
    sum += weight * value;
  }
  return 1 / (1 + Math.exp(-sum));
}
