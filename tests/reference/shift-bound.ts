/**
 * The smallest error with which a shift can be measured (Cramér–Rao), white noise, nothing else unknown:
 * var = 1 / Σ (dT/dx)² / sigma².
 *
 * @param derivative dT/dx of the noiseless signal at each pixel
 * @param sigma noise of each pixel
 * @returns 1-sigma, in the unit of x
 */
export function shiftBound(derivative: ArrayLike<number>, sigma: (pixel: number) => number): number {
  let information = 0;
  for (let i = 0; i < derivative.length; i++) information += (derivative[i]! / sigma(i)) ** 2;
  return 1 / Math.sqrt(information);
}

/**
 * Quality factor of a stellar spectrum for velocities (Bouchy, Pepe & Queloz 2001, A&A 374, 733):
 * W = λ² (dA/dλ)² / (A + σ_D²), Q = √ΣW / √ΣA; the bound on a velocity is c / (Q √ΣA) = c / √ΣW.
 *
 * @param photons A, counts of each pixel
 * @param derivative dA/dλ
 * @param detectorSigma σ_D, counts
 */
export function velocityQuality(
  wavelength: ArrayLike<number>,
  photons: ArrayLike<number>,
  derivative: ArrayLike<number>,
  detectorSigma: number,
): { readonly quality: number; readonly velocityBoundMS: number } {
  let weight = 0;
  let total = 0;
  for (let i = 0; i < photons.length; i++) {
    weight += (wavelength[i]! * derivative[i]!) ** 2 / (photons[i]! + detectorSigma ** 2);
    total += photons[i]!;
  }
  return { quality: Math.sqrt(weight / total), velocityBoundMS: 299_792_458 / Math.sqrt(weight) };
}
