/** Wavelengths below this are given in vacuum, angstrom: the custom of line lists. */
const VACUUM_BELOW_ANGSTROM = 2000;

/**
 * Vacuum wavelength (angstrom) of a line listed at standard-air wavelength (below 2000 angstrom: vacuum):
 * the inverse of Morton 2000 (ApJS 130, 403) as fitted by N. Piskunov for atomic line databases; within
 * 1e-8 angstrom of it above 2000 angstrom.
 */
export function listedToVacuum(wavelengthAngstrom: number): number {
  if (wavelengthAngstrom < VACUUM_BELOW_ANGSTROM) {
    return wavelengthAngstrom;
  }
  const s2 = (1e4 / wavelengthAngstrom) ** 2;
  const refraction =
    8.336624212083e-5 + 2.408926869968e-2 / (130.1065924522 - s2) + 1.599740894897e-4 / (38.92568793293 - s2);
  return wavelengthAngstrom * (1 + refraction);
}
