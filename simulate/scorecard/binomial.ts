/** A share with the interval that holds the true one in 95 of 100 repetitions. */
export interface Share {
  readonly count: number;
  readonly of: number;
  /** count / of; null when `of` is 0. */
  readonly value: number | null;
  readonly low: number;
  readonly high: number;
}

/** Two-sided 95 per cent point of the normal distribution. */
const Z_95 = 1.959963984540054;

/**
 * Wilson's score interval for a binomial share (Wilson 1927, J. Am. Stat. Assoc. 22, 209): unlike value ± error
 * it stays within 0..1 and says something when nothing or everything was counted.
 *
 * @param count 0 .. of
 * @returns the interval 0..1 when `of` is 0
 */
export function shareOf(count: number, of: number): Share {
  if (of === 0) return { count, of, value: null, low: 0, high: 1 };
  const value = count / of;
  const spread = Z_95 ** 2 / of;
  const centre = (value + spread / 2) / (1 + spread);
  const half = (Z_95 / (1 + spread)) * Math.sqrt((value * (1 - value)) / of + spread / (4 * of));
  return {
    count,
    of,
    value,
    low: count === 0 ? 0 : Math.max(0, centre - half),
    high: count === of ? 1 : Math.min(1, centre + half),
  };
}
