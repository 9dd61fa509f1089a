import type { RandomStream } from '../pipeline/core/random.ts';

/** Uniform in [low, high). */
export function between(random: RandomStream, low: number, high: number): number {
  return low + (high - low) * random.uniform();
}

/** Uniform in the logarithm; low and high > 0. */
export function betweenLog(random: RandomStream, low: number, high: number): number {
  return low * (high / low) ** random.uniform();
}

/** Normal with the given mean and standard deviation. */
export function around(random: RandomStream, mean: number, sigma: number): number {
  return mean + sigma * random.normal();
}

/** Log-normal: median, and standard deviation in dex. */
export function aroundDex(random: RandomStream, median: number, dex: number): number {
  return median * 10 ** (dex * random.normal());
}

/** Exponential with the given mean. */
export function exponential(random: RandomStream, mean: number): number {
  return -mean * Math.log(1 - random.uniform());
}

/** One of a list, each equally likely. */
export function oneOf<T>(random: RandomStream, values: readonly [T, ...T[]]): T {
  return values[random.integer(values.length)]!;
}

/** Number of events where `mean` are expected (product of uniforms: Knuth 1969, for means below 30). */
export function poisson(random: RandomStream, mean: number): number {
  const limit = Math.exp(-mean);
  let count = 0;
  for (let product = random.uniform(); product > limit; product *= random.uniform()) count++;
  return count;
}
