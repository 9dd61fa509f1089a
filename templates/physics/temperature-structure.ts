/** Where the cool relation hands over to the hot one, kelvin, and how softly. A choice, not published. */
const HANDOVER_K = 7600;
const HANDOVER_WIDTH_K = 350;

/**
 * q(tau) of the T^4 = 3/4 Teff^4 (tau + q) relation of stars with convective envelopes:
 * Krishna Swamy 1966, ApJ 145, 174 (fit to the Sun; from memory).
 */
export function coolSurfaceTerm(tau: number): number {
  return 1.39 - 0.815 * Math.exp(-2.54 * tau) - 0.025 * Math.exp(-30 * tau);
}

/** Hopf's q(tau) of the grey radiative atmosphere: a two-term fit, within 2 per cent of the exact function. */
export function greySurfaceTerm(tau: number): number {
  return 0.7104 - 0.1331 * Math.exp(-3.4488 * tau);
}

/**
 * Extra cooling of the outermost layers of hot stars, where lines radiate more than a grey gas does:
 * brings T(0) to 0.68 Teff, as line-blanketed atmospheres have. A choice, not published.
 */
const SURFACE_COOLING = 0.3;
const SURFACE_COOLING_DEPTH = 0.05;

/**
 * Temperature (K) at Rosseland optical depth `tau` of a star of effective temperature `effective` (K),
 * in radiative equilibrium.
 */
export function temperatureAt(effective: number, tau: number): number {
  const hot = greySurfaceTerm(tau) - SURFACE_COOLING * Math.exp(-Math.sqrt(tau / SURFACE_COOLING_DEPTH));
  const share = 1 / (1 + Math.exp(-(effective - HANDOVER_K) / HANDOVER_WIDTH_K));
  const q = (1 - share) * coolSurfaceTerm(tau) + share * hot;
  return (0.75 * effective ** 4 * (tau + q)) ** 0.25;
}
