import type { LogGrid } from '../../../templates/family.ts';

/** Band edges in ångström. */
export type Band = readonly [from: number, to: number];

/**
 * Mean of a spectrum over a band, weighted by wavelength to a power; obvious sum over pixels.
 * Power 2 turns flux per ångström into flux per frequency.
 */
function bandMean(grid: LogGrid, flux: Float32Array, [from, to]: Band, power: number): number {
  let sum = 0;
  let width = 0;
  for (let i = 0; i < grid.length; i++) {
    const wavelength = Math.exp(grid.lnStart + i * grid.step);
    if (wavelength < from || wavelength >= to) continue;
    const pixel = wavelength * grid.step;
    sum += flux[i]! * wavelength ** power * pixel;
    width += pixel;
  }
  return sum / width;
}

/** Narrow 4000 Å break (Balogh et al. 1999): flux per frequency in 4000–4100 over 3850–3950 Å. */
export function narrowBreak(grid: LogGrid, flux: Float32Array): number {
  return bandMean(grid, flux, [4000, 4100], 2) / bandMean(grid, flux, [3850, 3950], 2);
}

/** Equivalent width (Å) of an index of the Lick kind (Trager et al. 1998, eqs 1–2): straight pseudo-continuum. */
export function equivalentWidth(
  grid: LogGrid,
  flux: Float32Array,
  index: Band,
  blue: Band,
  red: Band,
): number {
  const middle = ([from, to]: Band): number => 0.5 * (from + to);
  const low = bandMean(grid, flux, blue, 0);
  const high = bandMean(grid, flux, red, 0);
  const slope = (high - low) / (middle(red) - middle(blue));
  let width = 0;
  for (let i = 0; i < grid.length; i++) {
    const wavelength = Math.exp(grid.lnStart + i * grid.step);
    if (wavelength < index[0] || wavelength >= index[1]) continue;
    const continuum = low + slope * (wavelength - middle(blue));
    width += (1 - flux[i]! / continuum) * wavelength * grid.step;
  }
  return width;
}
