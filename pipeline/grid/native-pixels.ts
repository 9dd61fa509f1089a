import type { Arm } from '../decode/spectrum.ts';
import { weighAtmosphere } from './atmosphere-bands.ts';
import type { NativePixels } from './grid.ts';
import type { GridOptions } from './grid-options.ts';
import { smoothLevel } from './level.ts';
import { maskSkyLines } from './sky-lines.ts';
import { findSpikes } from './spikes.ts';

const SPEED_OF_LIGHT_KM_S = 299792.458;
/** Width of the level's running median: 51 pixels of 69 km/s, wide against any stellar line. */
export const LEVEL_WIDTH_KM_S = 51 * 69;
/** Native pixels per level window, at least. */
const LEAST_LEVEL_PIXELS = 11;

/** 1 where an arm's pixel carries information: finite, weighted, in range, and not in a zero-filled or ragged end. */
export function usablePixels(arm: Arm, options: GridOptions): Uint8Array {
  const { flux, inverseVariance, wavelengthVacuumAngstrom: wavelength } = arm;
  const used = Uint8Array.from(flux, (f, i) =>
    Number.isFinite(f) &&
    inverseVariance[i]! > 0 &&
    Number.isFinite(inverseVariance[i]) &&
    wavelength[i]! >= options.wavelengthMinAngstrom &&
    wavelength[i]! <= options.wavelengthMaxAngstrom
      ? 1
      : 0,
  );
  for (const order of [ascending(flux.length), ascending(flux.length).reverse()]) {
    // A run of exact zeros at an end is padding: no detector reads exactly 0 twice.
    const firstLight = order.findIndex((i) => flux[i] !== 0 && Number.isFinite(flux[i]));
    const zeros = firstLight === -1 ? order.length : firstLight;
    if (zeros >= 2) for (const i of order.slice(0, zeros)) used[i] = 0;
    const edge = order.filter((i) => used[i] === 1).slice(0, options.edgePixels);
    for (const i of edge) used[i] = 0;
  }
  return used;
}

function ascending(n: number): number[] {
  return Array.from({ length: n }, (_, i) => i);
}

/**
 * Masks sky lines and spikes, applies the noise factor and the atmosphere's share of the error.
 *
 * @param used from `usablePixels`; changed in place and handed on
 * @param noiseFactor stated errors × factor = scatter seen
 * @param toAxis from `observatoryToAxis`
 */
export function cleanArm(
  arm: Arm,
  used: Uint8Array,
  noiseFactor: number,
  toAxis: number,
  options: GridOptions,
): NativePixels {
  const { flux, wavelengthVacuumAngstrom: wavelength, lineSpreadSigmaKmS } = arm;
  maskSkyLines(used, wavelength, options.skyLines, toAxis);
  const inverseVariance = Float64Array.from(used, (u, i) =>
    u === 1 ? arm.inverseVariance[i]! / noiseFactor ** 2 : 0,
  );
  if (options.rejectSpikes) {
    const sigmaPixels =
      lineSpreadSigmaKmS === undefined
        ? null
        : (i: number): number => lineSpreadSigmaKmS[i]! / pixelKmS(wavelength, i);
    for (const i of findSpikes(flux, inverseVariance, sigmaPixels)) {
      used[i] = 0;
      inverseVariance[i] = 0;
    }
  }
  const level = smoothLevel(flux, used, levelWindow(wavelength));
  weighAtmosphere(inverseVariance, used, level, wavelength, options.atmosphereBands, toAxis);
  for (let i = 0; i < used.length; i++) if (used[i] === 0) inverseVariance[i] = 0;
  return {
    wavelengthVacuumAngstrom: wavelength,
    flux,
    used,
    inverseVariance,
    level,
    ...(lineSpreadSigmaKmS === undefined ? {} : { lineSpreadSigmaKmS }),
  };
}

/** Native pixels in the level's window, odd. */
function levelWindow(wavelength: Float64Array): number {
  const half = LEVEL_WIDTH_KM_S / pixelKmS(wavelength, wavelength.length >> 1) / 2;
  const most = Math.max(LEAST_LEVEL_PIXELS, wavelength.length) >> 1;
  return 2 * Math.min(most, Math.max(LEAST_LEVEL_PIXELS >> 1, Math.round(half))) + 1;
}

/** Width of pixel i in km/s; 0 when the arm has a single pixel. */
function pixelKmS(wavelength: Float64Array, i: number): number {
  const low = Math.max(0, Math.min(i - 1, wavelength.length - 2));
  const high = Math.min(low + (i > 0 ? 2 : 1), wavelength.length - 1);
  return (SPEED_OF_LIGHT_KM_S * Math.log(wavelength[high]! / wavelength[low]!)) / Math.max(1, high - low);
}
