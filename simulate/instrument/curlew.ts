/** One arm of the spectrograph: linear in vacuum wavelength. */
export interface CurlewArm {
  readonly name: 'BLUE' | 'RED';
  readonly firstAngstrom: number;
  readonly stepAngstrom: number;
  readonly pixels: number;
  /** Fraction of photons above the atmosphere that are counted, fibre losses included, by wavelength. */
  efficiency(wavelengthAngstrom: number): number;
}

function arm(
  name: CurlewArm['name'],
  from: number,
  to: number,
  stepAngstrom: number,
  peak: number,
  best: number,
): CurlewArm {
  const halfWidth = 0.5 * (to - from);
  return {
    name,
    firstAngstrom: from,
    stepAngstrom,
    pixels: Math.round((to - from) / stepAngstrom) + 1,
    // A blaze and coatings, drawn by hand: a third of the peak is left at the ends.
    efficiency: (wavelength) => peak * Math.exp(-1.1 * ((wavelength - best) / halfWidth) ** 2),
  };
}

/** The invented Curlew spectrograph: two arms that overlap by 200 Å. */
export const CURLEW_ARMS: readonly CurlewArm[] = [
  arm('BLUE', 3650, 5900, 1, 0.19, 4850),
  arm('RED', 5700, 9650, 1.5, 0.23, 7500),
];

/** λ/Δλ, Δλ the full width at half maximum of the line spread. */
export const RESOLVING_POWER = 1900;

/** Sigma of the line spread, km/s: c / (R × 2 sqrt(2 ln 2)). */
export const LINE_SPREAD_KM_S = 299_792.458 / (RESOLVING_POWER * 2 * Math.sqrt(2 * Math.LN2));

export const FIBRES = 240;
/** Of 240 fibres 24 look at sky and 12 at stars of known velocity. */
export const SKY_SHARE = 0.1;
export const CALIBRATION_SHARE = 0.05;

/** Collecting area of the 3.1 m telescope less its secondary, cm². */
const AREA_CM2 = 68_000;
/** hc in erg × ångström. */
const PHOTON_ENERGY = 1.98644586e-8;
/** The unit of flux in the files, erg s⁻¹ cm⁻² Å⁻¹. */
export const FLUX_UNIT = 1e-17;

/** Electrons that one flux unit makes in one pixel. */
export function electronsPerUnit(
  arm: CurlewArm,
  wavelengthAngstrom: number,
  exposureS: number,
  airmass: number,
): number {
  const photons = (FLUX_UNIT * wavelengthAngstrom) / PHOTON_ENERGY;
  const air = 10 ** (-0.4 * airmass * extinctionMagnitudes(wavelengthAngstrom));
  return photons * AREA_CM2 * exposureS * arm.stepAngstrom * arm.efficiency(wavelengthAngstrom) * air;
}

/** Electrons of read-out noise per extracted pixel: 2.8 per detector pixel, four of them across a fibre. */
export const READ_NOISE = 2.8 * 2;

/**
 * Extinction of the air at one airmass: Rayleigh scattering falling with the fourth power of wavelength and an
 * aerosol part (Hayes & Latham 1975, ApJ 197, 593, their forms; coefficients for a low site from memory).
 */
function extinctionMagnitudes(wavelengthAngstrom: number): number {
  const microns = wavelengthAngstrom * 1e-4;
  return 0.0095 / microns ** 4 + 0.05 / microns ** 0.8;
}

/** Flux density, in flux units, of an object of AB magnitude 0 at a wavelength (Oke & Gunn 1983, ApJ 266, 713). */
export function fluxOfMagnitudeZero(wavelengthAngstrom: number): number {
  const lightSpeedAngstromPerS = 2.99792458e18;
  return (10 ** (-0.4 * 48.6) * lightSpeedAngstromPerS) / wavelengthAngstrom ** 2 / FLUX_UNIT;
}

/** The band magnitudes are given in, ångström. */
export const MAGNITUDE_BAND = { name: 'r', from: 5600, to: 7000 } as const;
