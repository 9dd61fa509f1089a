import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import { REST_WAVELENGTHS } from './rest-wavelengths.ts';

/** A resonance line of interstellar gas: vacuum Å and equivalent width in the rest frame, Å. */
interface AbsorptionLine {
  readonly wavelength: number;
  readonly equivalentWidth: number;
}

/**
 * Interstellar absorption of star-forming galaxies. Equivalent widths: below 2000 Å after the composite of
 * Shapley et al. 2003 (ApJ 588, 65), table 3; above, typical of star-forming galaxies at redshift 1 (Martin et
 * al. 2012, ApJ 760, 127); all from memory. Wavelengths: Morton 2003 (ApJS 149, 205).
 */
const ABSORPTION_LINES: readonly AbsorptionLine[] = [
  { wavelength: 1260.422, equivalentWidth: 1.63 },
  { wavelength: 1302.168, equivalentWidth: 1.2 },
  { wavelength: 1304.37, equivalentWidth: 1 },
  { wavelength: 1334.532, equivalentWidth: 1.72 },
  { wavelength: 1393.76, equivalentWidth: 1 },
  { wavelength: 1402.773, equivalentWidth: 0.8 },
  { wavelength: 1526.707, equivalentWidth: 1.72 },
  { wavelength: 1548.204, equivalentWidth: 1.6 },
  { wavelength: 1550.781, equivalentWidth: 1.4 },
  { wavelength: 1608.451, equivalentWidth: 0.91 },
  { wavelength: 1670.787, equivalentWidth: 1.04 },
  { wavelength: 1854.716, equivalentWidth: 0.7 },
  { wavelength: 1862.79, equivalentWidth: 0.5 },
  { wavelength: 2344.214, equivalentWidth: 1.6 },
  { wavelength: 2374.461, equivalentWidth: 1.2 },
  { wavelength: 2382.765, equivalentWidth: 1.7 },
  { wavelength: 2586.65, equivalentWidth: 1.7 },
  { wavelength: 2600.173, equivalentWidth: 1.9 },
  { wavelength: 2796.354, equivalentWidth: 2 },
  { wavelength: 2803.532, equivalentWidth: 1.7 },
  { wavelength: 2852.963, equivalentWidth: 0.7 },
];

/** Saturated lines share a width of about this standard deviation, km/s (Shapley et al. 2003, section 4). */
export const INTERSTELLAR_SIGMA_KM_S = 200;

/**
 * Light let through by the interstellar gas of a star-forming galaxy.
 *
 * @param strength 1 = as in the composites; 0 none; transmission never falls below zero
 * @returns one value in 0..1 per pixel, lines Gaussian in optical depth
 */
export function interstellarTransmission(grid: LogGrid, strength: number): Float32Array {
  const sigma = INTERSTELLAR_SIGMA_KM_S / LIGHT_SPEED_KM_S;
  const depth = new Float64Array(grid.length);
  for (const { wavelength, equivalentWidth } of ABSORPTION_LINES) {
    // Weak-line relation: equivalent width = central depth × sqrt(2π) σ λ, here for the optical depth.
    const central = (strength * equivalentWidth) / (Math.sqrt(2 * Math.PI) * sigma * wavelength);
    const centre = Math.log(wavelength);
    const from = Math.max(0, Math.ceil((centre - 6 * sigma - grid.lnStart) / grid.step));
    const to = Math.min(grid.length, Math.floor((centre + 6 * sigma - grid.lnStart) / grid.step) + 1);
    for (let i = from; i < to; i++) {
      depth[i]! += central * Math.exp(-0.5 * ((grid.lnStart + i * grid.step - centre) / sigma) ** 2);
    }
  }
  return Float32Array.from(depth, (value) => Math.exp(-value));
}

/** Interstellar Lyα absorption of galaxies without Lyα emission: about 15 Å (Shapley et al. 2003), and its width. */
const LYMAN_ALPHA_WIDTH = 15;
const LYMAN_ALPHA_SIGMA_KM_S = 1000;

/**
 * Light let through around Lyα by the neutral hydrogen of the galaxy itself; a Gaussian in optical depth stands
 * for the damped profile.
 *
 * @param strength 1 = 15 Å equivalent width in the weak-line relation; 0 none
 */
export function dampedLymanAlpha(grid: LogGrid, strength: number): Float32Array {
  const sigma = LYMAN_ALPHA_SIGMA_KM_S / LIGHT_SPEED_KM_S;
  const rest = REST_WAVELENGTHS.hydrogenLymanAlpha;
  const central = (strength * LYMAN_ALPHA_WIDTH) / (Math.sqrt(2 * Math.PI) * sigma * rest);
  const centre = (Math.log(rest) - grid.lnStart) / grid.step;
  return Float32Array.from({ length: grid.length }, (_, i) =>
    Math.exp(-central * Math.exp(-0.5 * (((i - centre) * grid.step) / sigma) ** 2)),
  );
}
