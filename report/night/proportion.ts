/** A share of a count with its uncertainty. */
export interface Proportion {
  readonly hits: number;
  readonly of: number;
  /** hits / of; null when nothing was tried. */
  readonly share: number | null;
  readonly low: number;
  readonly high: number;
}

/** Two-sided 68.27 %: one standard deviation of a normal distribution. */
const ONE_SIGMA = 1;

/**
 * Share with its Wilson (1927, JASA 22, 209) score interval, which stays inside 0..1 for few trials and for
 * shares of 0 and 1, where the normal interval has no width.
 *
 * @param hits 0..of
 */
export function proportion(hits: number, of: number, z: number = ONE_SIGMA): Proportion {
  if (of === 0) return { hits, of, share: null, low: 0, high: 1 };
  const p = hits / of;
  const centre = (p + (z * z) / (2 * of)) / (1 + (z * z) / of);
  const half = (z / (1 + (z * z) / of)) * Math.sqrt((p * (1 - p)) / of + (z * z) / (4 * of * of));
  return { hits, of, share: p, low: Math.max(0, centre - half), high: Math.min(1, centre + half) };
}

/**
 * Probability of `hits` or more out of `of` when each happens with chance `p`: the upper tail of the binomial
 * distribution, summed directly (counts per fibre are small).
 */
export function binomialTail(hits: number, of: number, p: number): number {
  if (hits <= 0) return 1;
  if (p <= 0) return 0;
  if (p >= 1) return 1;
  let term = Math.pow(1 - p, of);
  let below = 0;
  for (let k = 0; k < hits; k++) {
    below += term;
    term *= ((of - k) / (k + 1)) * (p / (1 - p));
  }
  return Math.max(0, 1 - below);
}
