/** A(V)/E(B−V) of the diffuse interstellar medium (Cardelli, Clayton & Mathis 1989). */
const DIFFUSE_RATIO = 3.1;

/** Value of the polynomial c0 + c1 x + c2 x² … (Horner). */
function polynomial(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}

/** O'Donnell 1994 (ApJ 422, 158), optical, in y = x − 1.82 µm⁻¹. */
const OPTICAL_A = [1, 0.104, -0.609, 0.701, 1.137, -1.718, -0.827, 1.647, -0.505];
const OPTICAL_B = [0, 1.952, 2.908, -3.989, -7.985, 11.102, 5.491, -10.805, 3.347];

/** Cardelli, Clayton & Mathis 1989 (ApJ 345, 245), eqs 5a, 5b: far ultraviolet, in x − 8 µm⁻¹. */
const FAR_ULTRAVIOLET_A = [-1.073, -0.628, 0.137, -0.07];
const FAR_ULTRAVIOLET_B = [13.67, 4.257, -0.42, 0.374];

/**
 * Extinction by dust of the Milky Way, A(λ)/A(V): Cardelli, Clayton & Mathis 1989 (ApJ 345, 245) with the
 * optical polynomials of O'Donnell 1994 (ApJ 422, 158).
 *
 * @param wavelengthAngstrom 1000 to 33,000 Å (0.3 to 10 µm⁻¹); the nearest end is used beyond
 * @param ratio R(V) = A(V)/E(B−V), default 3.1
 */
export function galacticExtinction(wavelengthAngstrom: number, ratio: number = DIFFUSE_RATIO): number {
  const x = Math.min(10, Math.max(0.3, 1e4 / wavelengthAngstrom));
  if (x < 1.1) return (0.574 - 0.527 / ratio) * x ** 1.61; // CCM89 eq 2
  if (x < 3.3) return polynomial(OPTICAL_A, x - 1.82) + polynomial(OPTICAL_B, x - 1.82) / ratio;
  if (x > 8) return polynomial(FAR_ULTRAVIOLET_A, x - 8) + polynomial(FAR_ULTRAVIOLET_B, x - 8) / ratio;
  // CCM89 eqs 4a, 4b; the last terms start at 5.9 µm⁻¹
  const beyond = Math.max(0, x - 5.9);
  const a =
    1.752 - 0.316 * x - 0.104 / ((x - 4.67) ** 2 + 0.341) - 0.04473 * beyond ** 2 - 0.009779 * beyond ** 3;
  const b =
    -3.09 + 1.825 * x + 1.206 / ((x - 4.62) ** 2 + 0.263) + 0.213 * beyond ** 2 + 0.1207 * beyond ** 3;
  return a + b / ratio;
}
