import { LINE_SPREAD_KM_S, type CurlewArm } from './curlew.ts';

/** What makes a sky line shine; lines of one origin brighten and fade together. */
export type SkyOrigin = 'oxygen' | 'hydroxyl' | 'other';

/**
 * Night-sky emission lines: vacuum wavelength (Å), flux in one fibre (flux units × ångström), origin.
 * Wavelengths: Osterbrock et al. 1996 (PASP 108, 277) and 1997 (PASP 109, 614), air, turned to vacuum; lamp
 * lines of sodium and mercury from memory. Fluxes are classes of strength (from memory) scaled to a dark site.
 */
const SKY_LINES: readonly (readonly [wavelength: number, flux: number, origin: SkyOrigin])[] = [
  [5578.89, 450, 'oxygen'],
  [5891.58, 90, 'other'],
  [5897.56, 90, 'other'],
  [6302.05, 300, 'oxygen'],
  [6365.54, 100, 'oxygen'],
  [3915.51, 10, 'other'],
  [4047.71, 25, 'other'],
  [4359.56, 25, 'other'],
  [5462.27, 25, 'other'],
  [5200.45, 10, 'other'],
  [5684.21, 25, 'other'],
  [5689.78, 25, 'other'],
  [6500.52, 35, 'hydroxyl'],
  [6534.85, 35, 'hydroxyl'],
  [6555.43, 35, 'hydroxyl'],
  [6865.85, 90, 'hydroxyl'],
  [6925.13, 90, 'hydroxyl'],
  [7278.41, 90, 'hydroxyl'],
  [7318.3, 90, 'hydroxyl'],
  [7342.91, 90, 'hydroxyl'],
  [7360.69, 35, 'hydroxyl'],
  [7573.83, 35, 'hydroxyl'],
  [7752.77, 90, 'hydroxyl'],
  [7762.13, 35, 'hydroxyl'],
  [7796.26, 90, 'hydroxyl'],
  [7810.62, 35, 'hydroxyl'],
  [7823.66, 90, 'hydroxyl'],
  [7843.42, 35, 'hydroxyl'],
  [7915.89, 200, 'hydroxyl'],
  [7951.39, 35, 'hydroxyl'],
  [7966.84, 200, 'hydroxyl'],
  [7995.53, 200, 'hydroxyl'],
  [8016.26, 35, 'hydroxyl'],
  [8027.88, 90, 'hydroxyl'],
  [8054.23, 35, 'hydroxyl'],
  [8064.2, 35, 'hydroxyl'],
  [8313.0, 35, 'hydroxyl'],
  [8346.9, 200, 'hydroxyl'],
  [8384.7, 90, 'hydroxyl'],
  [8401.48, 200, 'hydroxyl'],
  [8417.54, 90, 'hydroxyl'],
  [8432.49, 200, 'hydroxyl'],
  [8467.53, 90, 'hydroxyl'],
  [8495.72, 35, 'hydroxyl'],
  [8506.96, 90, 'hydroxyl'],
  [8763.72, 90, 'hydroxyl'],
  [8770.32, 90, 'hydroxyl'],
  [8780.74, 90, 'hydroxyl'],
  [8793.6, 90, 'hydroxyl'],
  [8829.52, 200, 'hydroxyl'],
  [8888.29, 200, 'hydroxyl'],
  [8905.56, 90, 'hydroxyl'],
  [8922.06, 200, 'hydroxyl'],
  [8945.85, 90, 'hydroxyl'],
  [8960.38, 90, 'hydroxyl'],
  [8990.83, 35, 'hydroxyl'],
  [9003.59, 35, 'hydroxyl'],
  [9040.43, 35, 'hydroxyl'],
  [9051.72, 35, 'hydroxyl'],
  [9378.53, 200, 'hydroxyl'],
  [9422.31, 90, 'hydroxyl'],
  [9442.24, 200, 'hydroxyl'],
  [9461.12, 90, 'hydroxyl'],
  [9479.35, 90, 'hydroxyl'],
  [9505.42, 90, 'hydroxyl'],
  [9521.79, 90, 'hydroxyl'],
  [9555.15, 90, 'hydroxyl'],
  [9569.71, 90, 'hydroxyl'],
  [9610.36, 35, 'hydroxyl'],
  [9623.27, 35, 'hydroxyl'],
];

/** Sky in one fibre at 6000 Å, flux units: 21.1 mag per square arcsecond over 3.1 square arcseconds. */
const CONTINUUM_AT_6000 = 3.2;
/** It rises to the red by this power of wavelength (by eye from published dark-sky spectra). */
const CONTINUUM_SLOPE = 0.8;

/** How bright each origin is in one exposure, relative to the mean night. */
export type SkyBrightness = Readonly<Record<SkyOrigin | 'continuum', number>>;

/**
 * The sky one fibre sees, flux units, at the pixels of an arm.
 *
 * @param spreadFactor line spread of this fibre relative to the mean
 * @param shiftPixels displacement of the lines, for the residual a shifted sky leaves
 */
export function skyLight(
  arm: CurlewArm,
  brightness: SkyBrightness,
  spreadFactor: number,
  shiftPixels: number,
): Float64Array {
  const sky = new Float64Array(arm.pixels);
  for (let i = 0; i < arm.pixels; i++) {
    const wavelength = arm.firstAngstrom + i * arm.stepAngstrom;
    sky[i] = brightness.continuum * CONTINUUM_AT_6000 * (wavelength / 6000) ** CONTINUUM_SLOPE;
  }
  for (const [wavelength, flux, origin] of SKY_LINES) {
    const sigma = (wavelength * LINE_SPREAD_KM_S * spreadFactor) / 299_792.458 / arm.stepAngstrom;
    const centre = (wavelength - arm.firstAngstrom) / arm.stepAngstrom + shiftPixels;
    const peak = (brightness[origin] * flux) / (Math.sqrt(2 * Math.PI) * sigma * arm.stepAngstrom);
    const first = Math.max(0, Math.ceil(centre - 6 * sigma));
    const end = Math.min(arm.pixels, Math.floor(centre + 6 * sigma) + 1);
    for (let i = first; i < end; i++) sky[i]! += peak * Math.exp(-0.5 * ((i - centre) / sigma) ** 2);
  }
  return sky;
}
