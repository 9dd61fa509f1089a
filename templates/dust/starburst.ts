/** R'(V) of the starburst attenuation curve (Calzetti et al. 2000, eq 5). */
const RATIO = 4.05;

/** Shortest wavelength the curve was measured at, ångström; it is held constant below. */
const SHORTEST_ANGSTROM = 1200;

/**
 * Attenuation of starlight in galaxies, A(λ)/A(V): Calzetti et al. 2000 (ApJ 533, 682), eq 4.
 *
 * @param wavelengthAngstrom 1200 to 22,000 Å; the value at 1200 Å is used below it
 */
export function starburstAttenuation(wavelengthAngstrom: number): number {
  const microns = Math.max(SHORTEST_ANGSTROM, wavelengthAngstrom) * 1e-4;
  const slope =
    microns < 0.63
      ? -2.156 + 1.509 / microns - 0.198 / microns ** 2 + 0.011 / microns ** 3
      : -1.857 + 1.04 / microns;
  return (2.659 * slope + RATIO) / RATIO;
}
