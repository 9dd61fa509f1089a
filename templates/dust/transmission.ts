/** The fraction of light that dust lets through: 10^(−0.4 A), A in magnitudes. */
export function dustTransmission(magnitudes: number): number {
  return 10 ** (-0.4 * magnitudes);
}

/**
 * A spectrum seen through dust.
 *
 * @param flux one value per wavelength
 * @param wavelengths ångström
 * @param curve A(λ) per unit of `amount` at a wavelength in ångström
 * @param amount A(V) or E(B−V), whichever the curve is stated for, magnitudes
 */
export function behindDust(
  flux: Float32Array,
  wavelengths: Float64Array,
  curve: (wavelengthAngstrom: number) => number,
  amount: number,
): Float32Array {
  if (amount === 0) return flux;
  return flux.map((value, i) => value * dustTransmission(amount * curve(wavelengths[i]!)));
}
