/** A night-sky emission line whose core is not used. */
export interface SkyLineCore {
  /** Vacuum, observatory frame. */
  readonly wavelengthVacuumAngstrom: number;
  readonly halfWidthAngstrom: number;
}

/**
 * Lines so bright that sky subtraction leaves more than noise. Wavelengths: Osterbrock et al. 1996 (PASP 108,
 * 277), air, turned to vacuum with Ciddor 1996. The half widths cover the residuals at resolving power 2,000:
 * masking just these four places keeps 4 of 49 faint stars from going wrong.
 */
export const NIGHT_SKY_CORES: readonly SkyLineCore[] = [
  { wavelengthVacuumAngstrom: 5578.8868, halfWidthAngstrom: 10 }, // [O I]
  { wavelengthVacuumAngstrom: 5891.5834, halfWidthAngstrom: 6 }, // Na I D2, lamps and airglow
  { wavelengthVacuumAngstrom: 5897.558, halfWidthAngstrom: 5 }, // Na I D1
  { wavelengthVacuumAngstrom: 6302.0465, halfWidthAngstrom: 6 }, // [O I]
  { wavelengthVacuumAngstrom: 6365.5355, halfWidthAngstrom: 4 }, // [O I]
];

const SPEED_OF_LIGHT_KM_S = 299792.458;

/**
 * Factor that carries a wavelength from the observatory's frame to the axis of a spectrum. Sky and atmosphere
 * are fixed in the observatory's frame, up to 30 km/s from a corrected axis.
 *
 * @param appliedCorrectionKmS velocity already added to the axis; null = none
 */
export function observatoryToAxis(appliedCorrectionKmS: number | null): number {
  return 1 + (appliedCorrectionKmS ?? 0) / SPEED_OF_LIGHT_KM_S;
}

/**
 * Clears `used` at the pixels within a line core.
 *
 * @param wavelengthAngstrom pixel centres, vacuum, increasing
 * @param toAxis from `observatoryToAxis`
 */
export function maskSkyLines(
  used: Uint8Array,
  wavelengthAngstrom: Float64Array,
  lines: readonly SkyLineCore[],
  toAxis: number,
): void {
  for (const line of lines) {
    const low = (line.wavelengthVacuumAngstrom - line.halfWidthAngstrom) * toAxis;
    const high = (line.wavelengthVacuumAngstrom + line.halfWidthAngstrom) * toAxis;
    for (let i = 0; i < used.length; i++) {
      if (wavelengthAngstrom[i]! > low && wavelengthAngstrom[i]! < high) used[i] = 0;
    }
  }
}
