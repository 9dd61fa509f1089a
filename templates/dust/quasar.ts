/**
 * Reddening of quasars, A(λ)/E(B−V) = 1.39 λ_µm^−1.2: the featureless curve of the Small Magellanic Cloud as
 * fitted to reddened quasars (Prevot et al. 1984, in the form used by Richards et al. 2003; coefficients from
 * memory).
 *
 * @param wavelengthAngstrom > 0
 */
export function quasarReddening(wavelengthAngstrom: number): number {
  return 1.39 * (wavelengthAngstrom * 1e-4) ** -1.2;
}
