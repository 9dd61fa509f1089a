/**
 * Factor by which spectral lines raise the Rosseland mean above that of the continuum, at a temperature (K)
 * and metallicity (dex): atomic lines below 7500 K, more of them below 4800 K, and molecular bands around
 * 2600 K. Without the last term the bands of M dwarfs saturate and Na D is washed out.
 * Chosen to resemble published opacity tables; calibrated, not published.
 */
export function blanketingFactor(temperature: number, metallicity: number): number {
  const atoms =
    0.35 / (1 + Math.exp((temperature - 7500) / 500)) + 0.6 / (1 + Math.exp((temperature - 4800) / 300));
  const molecules = 12 * Math.exp(-(((temperature - 2600) / 700) ** 2));
  return 1 + 10 ** (0.7 * metallicity) * atoms + 10 ** metallicity * molecules;
}
