import type { LogGrid } from '../templates/family.ts';

/** Light of an object in its own rest frame: flux density per ångström on a grid uniform in ln wavelength. */
export interface RestSpectrum {
  readonly grid: LogGrid;
  /** Any positive scale; an observation scales it to a magnitude. */
  readonly flux: Float32Array;
  /** Velocity width (Gaussian sigma, km/s) the spectrum already has everywhere from how it was made. */
  readonly sharpnessKmS: number;
}

export const LIGHT_SPEED_KM_S = 299_792.458;

/** A Gaussian feature. */
export interface Bump {
  /** Rest wavelength, vacuum ångström. */
  readonly wavelength: number;
  /** Velocity width (sigma), km/s, > 0. */
  readonly sigmaKmS: number;
  /** Integral over wavelength, flux density × ångström. */
  readonly flux: number;
}

/** Bumps are drawn to 5 sigma, where a Gaussian is 4e-6 of its peak. */
const REACH_IN_SIGMA = 5;

/**
 * Adds bumps to a spectrum, each by its value at pixel centres. Meant for widths of a pixel and more: at half
 * a pixel the sum over pixels is off by 1.4 per cent.
 *
 * @param flux changed in place, on `grid`
 */
export function addBumps(flux: Float32Array, grid: LogGrid, bumps: readonly Bump[]): void {
  for (const bump of bumps) {
    const sigma = bump.sigmaKmS / LIGHT_SPEED_KM_S / grid.step;
    const centre = (Math.log(bump.wavelength) - grid.lnStart) / grid.step;
    const first = Math.max(0, Math.ceil(centre - REACH_IN_SIGMA * sigma));
    const end = Math.min(grid.length, Math.floor(centre + REACH_IN_SIGMA * sigma) + 1);
    const sigmaAngstrom = (bump.wavelength * bump.sigmaKmS) / LIGHT_SPEED_KM_S;
    const peak = bump.flux / (Math.sqrt(2 * Math.PI) * sigmaAngstrom);
    for (let i = first; i < end; i++) flux[i]! += peak * Math.exp(-0.5 * ((i - centre) / sigma) ** 2);
  }
}

/** Vacuum wavelength of pixel i, ångström. */
export function wavelengthOf(grid: LogGrid, i: number): number {
  return Math.exp(grid.lnStart + i * grid.step);
}

/**
 * Mean flux density of the pixels whose centres lie in a band.
 *
 * @returns 0 when the band holds no pixel
 */
export function meanIn(grid: LogGrid, flux: Float32Array, fromAngstrom: number, toAngstrom: number): number {
  const first = Math.max(0, Math.ceil((Math.log(fromAngstrom) - grid.lnStart) / grid.step));
  const end = Math.min(grid.length, Math.floor((Math.log(toAngstrom) - grid.lnStart) / grid.step) + 1);
  let sum = 0;
  for (let i = first; i < end; i++) sum += flux[i]!;
  return end > first ? sum / (end - first) : 0;
}
