import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';
import type { GroupLine } from './emission-groups.ts';

/** Lines are drawn to 5 sigma, where a Gaussian is 4e-6 of its peak. */
const REACH_IN_SIGMA = 5;

/**
 * Error function, absolute error below 1.5e-7: Abramowitz & Stegun 1964, eq 7.1.26.
 */
export function errorFunction(x: number): number {
  const t = 1 / (1 + 0.3275911 * Math.abs(x));
  const series =
    t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  return Math.sign(x) * (1 - series * Math.exp(-x * x));
}

/** A spectrum that is zero outside `first .. end-1`. */
export interface DrawnLines {
  readonly flux: Float32Array;
  readonly first: number;
  readonly end: number;
}

/**
 * Draws Gaussian emission lines as the mean flux density of each pixel, so that they keep their flux however
 * narrow they are.
 *
 * @param sigmaKmS velocity width (standard deviation) of every line, > 0
 * @returns flux density per ångström; the flux of a line wholly on the grid is its `flux`. `first = end = 0`
 *   when no line falls on the grid
 */
export function drawLines(grid: LogGrid, lines: readonly GroupLine[], sigmaKmS: number): DrawnLines {
  const flux = new Float32Array(grid.length);
  const sigma = sigmaKmS / LIGHT_SPEED_KM_S / grid.step;
  let first = grid.length;
  let end = 0;
  for (const { wavelength, flux: total } of lines) {
    const centre = (Math.log(wavelength) - grid.lnStart) / grid.step;
    const from = Math.max(0, Math.ceil(centre - REACH_IN_SIGMA * sigma - 0.5));
    const to = Math.min(grid.length, Math.floor(centre + REACH_IN_SIGMA * sigma + 0.5) + 1);
    if (from >= to) continue;
    first = Math.min(first, from);
    end = Math.max(end, to);
    const scale = 1 / (sigma * Math.SQRT2);
    let below = errorFunction((from - 0.5 - centre) * scale);
    for (let i = from; i < to; i++) {
      const above = errorFunction((i + 0.5 - centre) * scale);
      const width = grid.step * Math.exp(grid.lnStart + i * grid.step);
      flux[i]! += (0.5 * total * (above - below)) / width;
      below = above;
    }
  }
  return end === 0 ? { flux, first: 0, end: 0 } : { flux, first, end };
}
