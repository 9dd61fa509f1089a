/** A flag has few values; a count of anything has more. */
const MOST_FLAG_VALUES = 8;

/**
 * Whether a column can be a flag: whole numbers, few different ones.
 *
 * @param values not empty
 */
export function looksLikeFlag(values: Float64Array): boolean {
  const distinct = new Set<number>();
  for (const value of values) {
    if (!Number.isInteger(value)) return false;
    distinct.add(value);
    if (distinct.size > MOST_FLAG_VALUES) return false;
  }
  return true;
}

/** Which value of a flag marks bad pixels, and how that is known. */
export interface FlagPolarity {
  readonly badWhen: 'nonzero' | 'zero';
  readonly because: string;
}

/**
 * Decide by evidence which flag value is bad: pixels without light (exactly 0 or not finite) gather under it;
 * without such pixels the rarer value is bad, since no one writes out a spectrum that is mostly unusable.
 *
 * @param flag whole numbers
 * @param flux same length
 */
export function flagPolarity(flag: Float64Array, flux: Float64Array): FlagPolarity {
  const counts = { zero: 0, nonzero: 0, emptyZero: 0, emptyNonzero: 0 };
  flag.forEach((value, i) => {
    const isEmpty = flux[i] === 0 || !Number.isFinite(flux[i]);
    if (value === 0) {
      counts.zero += 1;
      if (isEmpty) counts.emptyZero += 1;
    } else {
      counts.nonzero += 1;
      if (isEmpty) counts.emptyNonzero += 1;
    }
  });
  const shareZero = counts.zero === 0 ? 0 : counts.emptyZero / counts.zero;
  const shareNonzero = counts.nonzero === 0 ? 0 : counts.emptyNonzero / counts.nonzero;
  if (shareNonzero !== shareZero) {
    const badWhen = shareNonzero > shareZero ? 'nonzero' : 'zero';
    return { badWhen, because: 'pixels without light gather there' };
  }
  return { badWhen: counts.nonzero > counts.zero ? 'zero' : 'nonzero', because: 'it is the rarer value' };
}
