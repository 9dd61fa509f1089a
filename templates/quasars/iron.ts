import type { LogGrid } from '../family.ts';
import { KELVIN_PER_EV, LIGHT_SPEED_KM_S, SECOND_RADIATION } from '../physics/constants.ts';
import { broaden } from '../prepare/broaden.ts';
import { pixelAt } from '../prepare/log-grid.ts';

/** A line of singly ionised iron: vacuum Å, energy of the lower level in eV, gf. */
export interface IronLine {
  readonly wavelength: number;
  readonly energyEv: number;
  readonly gf: number;
}

/** Temperature of the gas, K, and optical depth of its strongest line (chosen by eye on published templates). */
const TEMPERATURE = 9000;
const GREATEST_DEPTH = 300;
/** Width the stored template has, km/s (standard deviation): narrower than any broad-line region. */
export const IRON_SIGMA_KM_S = 1200;
/** Lines between these make the template, ångström. */
const SHORTEST = 1500;
const LONGEST = 7500;

/**
 * The blend of Fe II lines of a broad-line region: each line thermal and optically thick, so that it shines
 * with (1 − e^−τ) λ⁻⁴ / (e^(hc/λkT) − 1), τ ∝ gf e^(−E/kT) λ. A physical guess at the shape only: no
 * fluorescence, no radiative transfer between lines.
 *
 * @param lines at least one between 1500 and 7500 Å
 * @param grid on which to draw it
 * @returns flux density per ångström, peak 1, {@link IRON_SIGMA_KM_S} wide
 * @throws RangeError when no line falls in the range
 */
export function ironBlend(lines: readonly IronLine[], grid: LogGrid): Float32Array {
  const used = lines.filter(({ wavelength }) => wavelength > SHORTEST && wavelength < LONGEST);
  if (used.length === 0)
    throw new RangeError('ironBlend must be given lines between 1500 and 7500 Å, got none');
  const depths = used.map(
    ({ wavelength, energyEv, gf }) => gf * Math.exp((-energyEv * KELVIN_PER_EV) / TEMPERATURE) * wavelength,
  );
  const deepest = depths.reduce((most, depth) => Math.max(most, depth), 0);
  const sharp = new Float64Array(grid.length);
  used.forEach(({ wavelength }, k) => {
    const depth = (GREATEST_DEPTH * depths[k]!) / deepest;
    const planck = wavelength ** -4 / Math.expm1((SECOND_RADIATION * 1e8) / wavelength / TEMPERATURE);
    const pixel = Math.round(pixelAt(grid, wavelength));
    if (pixel < 0 || pixel >= grid.length) return;
    sharp[pixel]! += (-Math.expm1(-depth) * planck) / wavelength;
  });
  const smooth = broaden(sharp, IRON_SIGMA_KM_S / LIGHT_SPEED_KM_S / grid.step);
  const peak = smooth.reduce((most, value) => Math.max(most, value), 0);
  return smooth.map((value) => value / peak);
}
