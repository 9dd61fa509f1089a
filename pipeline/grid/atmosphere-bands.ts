/** A band in which the atmosphere absorbs. */
export interface AtmosphereBand {
  readonly name: string;
  /** Vacuum, observatory frame. */
  readonly fromAngstrom: number;
  readonly toAngstrom: number;
  /** 1-sigma of what correction for the band leaves behind, relative to the flux level; 'mask' drops the band. */
  readonly relativeError: number | 'mask';
}

/**
 * Bands of oxygen and water. Limits: common practice, no source, moved from air to vacuum. The relative errors
 * are about a third of the usual depth at sea-level sites (from memory): a bright continuum loses the band, a
 * faint object keeps it, and an emission line on a faint continuum is seen through it.
 */
export const ATMOSPHERE_BANDS: readonly AtmosphereBand[] = [
  { name: 'O2 gamma', fromAngstrom: 6278, toAngstrom: 6320, relativeError: 0.03 },
  { name: 'O2 B', fromAngstrom: 6867, toAngstrom: 6960, relativeError: 0.15 },
  { name: 'H2O 7200', fromAngstrom: 7162, toAngstrom: 7342, relativeError: 0.1 },
  { name: 'O2 A', fromAngstrom: 7592, toAngstrom: 7710, relativeError: 0.3 },
  { name: 'H2O 8200', fromAngstrom: 8127, toAngstrom: 8347, relativeError: 0.1 },
  { name: 'H2O 9100', fromAngstrom: 8942, toAngstrom: 9222, relativeError: 0.12 },
  { name: 'H2O 9400', fromAngstrom: 9293, toAngstrom: 9803, relativeError: 0.2 },
];

/**
 * Adds the atmosphere's share to the variance: sigma² + (relativeError × level)² inside a band.
 *
 * @param inverseVariance changed in place; 0 stays 0
 * @param used cleared inside bands that are masked
 * @param level smooth flux, same unit as 1/√inverseVariance
 * @param toAxis from `observatoryToAxis`
 */
export function weighAtmosphere(
  inverseVariance: Float64Array,
  used: Uint8Array,
  level: Float64Array,
  wavelengthAngstrom: Float64Array,
  bands: readonly AtmosphereBand[],
  toAxis: number,
): void {
  for (const band of bands) {
    const low = band.fromAngstrom * toAxis;
    const high = band.toAngstrom * toAxis;
    for (let i = 0; i < used.length; i++) {
      if (used[i] === 0 || wavelengthAngstrom[i]! < low || wavelengthAngstrom[i]! > high) continue;
      if (band.relativeError === 'mask') used[i] = 0;
      else {
        const extra = (band.relativeError * level[i]!) ** 2;
        inverseVariance[i] = 1 / (1 / inverseVariance[i]! + extra);
      }
    }
  }
}
