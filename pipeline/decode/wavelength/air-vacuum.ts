/** Below this, wavelengths are given in vacuum everywhere (common practice, no source). */
export const SHORTEST_AIR_WAVELENGTH_ANGSTROM = 2_000;

/** Each step of the inverse gains about 6 digits (dn/dλ·λ is 1e-6 at most), so three reach double precision. */
const INVERSE_STEPS = 4;

/**
 * Refractive index of dry air at 15 °C, 101,325 Pa and 450 ppm CO2: Ciddor (1996, Applied Optics 35, 1566, eq. 1
 * with the constants of its Appendix A). Holds from 2,300 Å to 17,000 Å; used from 2,000 Å on.
 *
 * The formula of the FITS standard (Greisen et al. 2006, eq. 65) is air at 0 °C and 4.7 km/s off: not used.
 *
 * @param vacuumAngstrom wavelength in vacuum, above 2,000 Å
 */
function refractiveIndex(vacuumAngstrom: number): number {
  const waveNumberSquared = (1e4 / vacuumAngstrom) ** 2;
  return 1 + 0.05792105 / (238.0185 - waveNumberSquared) + 0.00167917 / (57.362 - waveNumberSquared);
}

/**
 * Wavelength in standard air of light whose vacuum wavelength is given.
 *
 * @param vacuumAngstrom ångström, > 0; values below 2,000 Å come back unchanged
 * @returns ångström
 */
export function vacuumToAir(vacuumAngstrom: number): number {
  if (vacuumAngstrom < SHORTEST_AIR_WAVELENGTH_ANGSTROM) return vacuumAngstrom;
  return vacuumAngstrom / refractiveIndex(vacuumAngstrom);
}

/**
 * Wavelength in vacuum of light whose wavelength in standard air is given: the exact inverse of `vacuumToAir`.
 *
 * @param airAngstrom ångström, > 0; values below 2,000 Å are taken to be vacuum already
 * @returns ångström
 */
export function airToVacuum(airAngstrom: number): number {
  if (airAngstrom < vacuumToAir(SHORTEST_AIR_WAVELENGTH_ANGSTROM)) return airAngstrom;
  let vacuum = airAngstrom;
  for (let step = 0; step < INVERSE_STEPS; step += 1) vacuum = airAngstrom * refractiveIndex(vacuum);
  return vacuum;
}
