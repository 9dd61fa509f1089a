import type { LogGrid } from '../family.ts';
import { meanOver } from '../prepare/log-grid.ts';

/** Bands that give the ultraviolet slope, ångström; between strong lines. */
const BLUE_BAND: readonly [number, number] = [1470, 1520];
const RED_BAND: readonly [number, number] = [1900, 2000];
/** Slopes outside this are not seen in young populations (Calzetti, Kinney & Storchi-Bergmann 1994). */
const STEEPEST = -2.8;
const FLATTEST = 0;
/** The Lyman limit, ångström, and the share of stellar light that hydrogen in the galaxy lets out below it. */
const LYMAN_LIMIT = 911.75;
const ESCAPE_SHARE = 0.1;

/**
 * Continues a population shortward of where the stellar models end, as a power law with its own ultraviolet
 * slope. Stellar lines below that wavelength are left out.
 *
 * @param flux on `grid`, zero below `from`
 * @param from ångström, where the stored light begins
 */
export function withFarUltraviolet(grid: LogGrid, flux: Float32Array, from: number): Float32Array {
  const blue = meanOver(grid, flux, BLUE_BAND[0], BLUE_BAND[1]);
  const red = meanOver(grid, flux, RED_BAND[0], RED_BAND[1]);
  const blueCentre = 0.5 * (BLUE_BAND[0] + BLUE_BAND[1]);
  const redCentre = 0.5 * (RED_BAND[0] + RED_BAND[1]);
  const slope = Math.log(red / blue) / Math.log(redCentre / blueCentre);
  const bounded = Math.min(FLATTEST, Math.max(STEEPEST, slope));
  return flux.map((value, i) => {
    const wavelength = Math.exp(grid.lnStart + i * grid.step);
    if (wavelength >= from) return value;
    const share = wavelength < LYMAN_LIMIT ? ESCAPE_SHARE : 1;
    return share * blue * (wavelength / blueCentre) ** bounded;
  });
}
