/**
 * Cosine bell: rises from 0 to 1 over the first part of an array, falls over the last, 1 between (Brault &
 * White 1971).
 *
 * @param n length
 * @param fraction of the array at each end, 0 .. 0.5
 */
export function cosineBell(n: number, fraction: number): Float64Array {
  const width = Math.max(1, Math.round(fraction * n));
  return Float64Array.from({ length: n }, (_, i) => {
    const fromEnd = Math.min(i, n - 1 - i) + 0.5;
    return fromEnd >= width ? 1 : 0.5 * (1 - Math.cos((Math.PI * fromEnd) / width));
  });
}
