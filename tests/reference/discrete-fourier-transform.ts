/** The definition, summed term by term: X[k] = Σ x[n] exp(−2πi k n / N), in natural order. */
export function discreteFourierTransform(
  re: Float64Array,
  im: Float64Array,
): { re: Float64Array; im: Float64Array } {
  const size = re.length;
  const out = { re: new Float64Array(size), im: new Float64Array(size) };
  for (let k = 0; k < size; k++) {
    for (let n = 0; n < size; n++) {
      // k n modulo N keeps the angle small, hence exact.
      const angle = (-2 * Math.PI * ((k * n) % size)) / size;
      out.re[k]! += re[n]! * Math.cos(angle) - im[n]! * Math.sin(angle);
      out.im[k]! += re[n]! * Math.sin(angle) + im[n]! * Math.cos(angle);
    }
  }
  return out;
}

/** The whole number whose bits are those of k in reverse, for numbers below the power of two `size`. */
export function bitReverse(k: number, size: number): number {
  let reversed = 0;
  for (let bit = 1; bit < size; bit *= 2) reversed = reversed * 2 + (k & bit ? 1 : 0);
  return reversed;
}
