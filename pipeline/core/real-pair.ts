/**
 * Splits the transform of a + i·b into the transforms of the real arrays a and b, in bit-reversed order:
 * A[k] = (X[k] + conj X[−k]) / 2, B[k] = (X[k] − conj X[−k]) / 2i (Press et al. 2007, section 12.3.1).
 *
 * In bit-reversed order the frequencies k and −k sit at mirrored places of each block [2^m, 2^(m+1)).
 *
 * @param re,im transform of a + i·b as `Fft.forward` leaves it; not changed
 * @param aRe,aIm,bRe,bIm receive the two transforms, same length and order
 */
export function separatePair(
  re: Float64Array,
  im: Float64Array,
  aRe: Float64Array,
  aIm: Float64Array,
  bRe: Float64Array,
  bIm: Float64Array,
): void {
  for (let low = 0, high = 1; high <= re.length; low = high, high *= 2) {
    for (let p = low; p < high; p++) {
      const q = low + high - 1 - p;
      aRe[p] = 0.5 * (re[p]! + re[q]!);
      aIm[p] = 0.5 * (im[p]! - im[q]!);
      bRe[p] = 0.5 * (im[p]! + im[q]!);
      bIm[p] = 0.5 * (re[q]! - re[p]!);
    }
  }
}
