import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S, SECOND_RADIATION } from '../physics/constants.ts';
import { broaden } from '../prepare/broaden.ts';
import { meanOver, wavelengthsOf } from '../prepare/log-grid.ts';

/** Edge of the Balmer series in vacuum, ångström. */
const EDGE = 3646;
/** Temperature (K) and optical depth at the edge of the emitting gas (Grandi 1982, ApJ 255, 25, eq 7 form). */
const TEMPERATURE = 12_000;
const EDGE_DEPTH = 1;
/** Width of the lines that merge into the edge, km/s. */
const SIGMA_KM_S = 3000;
/** High Balmer lines that are not drawn one by one: from H7 (n = 7) up. */
const FIRST_LEVEL = 7;
const LAST_LEVEL = 39;

/**
 * The small blue bump of quasars: partly thick free-bound emission below 3646 Å (Grandi 1982) and the Balmer
 * lines n = 7…39 that run into it.
 *
 * @returns flux density per ångström with mean 1 in 3500–3640 Å before smoothing
 */
export function balmerContinuum(grid: LogGrid): Float32Array {
  const wavelengths = wavelengthsOf(grid);
  const bump = new Float64Array(grid.length);
  for (let i = 0; i < grid.length; i++) {
    const wavelength = wavelengths[i]!;
    if (wavelength > EDGE) continue;
    const planck = wavelength ** -5 / Math.expm1((SECOND_RADIATION * 1e8) / wavelength / TEMPERATURE);
    bump[i] = -Math.expm1(-EDGE_DEPTH * (wavelength / EDGE) ** 3) * planck;
  }
  const scale = 1 / meanOver(grid, bump, 3500, 3640);
  for (let i = 0; i < grid.length; i++) bump[i]! *= scale;
  const sigma = SIGMA_KM_S / LIGHT_SPEED_KM_S;
  for (let level = FIRST_LEVEL; level <= LAST_LEVEL; level++) {
    const centre = 3647.05 / (1 - 4 / level ** 2);
    // Strengths fall as n^−2.6 (Storey & Hummer 1995, fitted); 0.38 keeps the blend within a factor two of the edge.
    const strength = 0.38 * (level / FIRST_LEVEL) ** -2.6;
    for (let i = 0; i < grid.length; i++) {
      const off = Math.log(wavelengths[i]! / centre) / sigma;
      if (Math.abs(off) < 6) bump[i]! += strength * Math.exp(-0.5 * off * off);
    }
  }
  return broaden(bump, sigma / grid.step);
}
