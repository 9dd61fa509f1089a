import { edgesFromCentres, rebinDensity } from '../../pipeline/core/rebin.ts';
import type { RandomStream } from '../../pipeline/core/random.ts';
import { broaden, missingWidthKmS } from '../../templates/prepare/broaden.ts';
import { LIGHT_SPEED_KM_S, meanIn, type RestSpectrum } from '../rest-spectrum.ts';
import type { Source } from '../sources/source.ts';
import { bandResidual } from './atmosphere.ts';
import {
  type CurlewArm,
  electronsPerUnit,
  fluxOfMagnitudeZero,
  LINE_SPREAD_KM_S,
  MAGNITUDE_BAND,
  READ_NOISE,
} from './curlew.ts';
import { drawCosmicRays, type FibreFlaws } from './flaws.ts';
import { QUALITY } from './quality.ts';
import { type SkyBrightness, skyLight } from './sky-light.ts';

/** How one fibre is observed. */
export interface Observing {
  readonly exposureS: number;
  readonly airmass: number;
  readonly sky: SkyBrightness;
  readonly flaws: FibreFlaws;
}

/** One arm of one extracted spectrum; all arrays have one value per pixel. */
export interface ObservedArm {
  /** Flux units of `FLUX_UNIT`, sky subtracted. */
  readonly flux: Float32Array;
  /** 1-sigma as the reduction states it. */
  readonly error: Float32Array;
  /** 0 = good. */
  readonly quality: Uint8Array;
  /** The sky that was subtracted. */
  readonly sky: Float32Array;
  /** Sigma of the line spread, pixels. */
  readonly lineSpread: Float32Array;
}

/**
 * Resampling during the reduction spreads each pixel's noise into its neighbours: share that goes to each
 * side. The lag-1 correlation is about twice this.
 */
const NOISE_SPILL = 0.08;
/** The reduction does not know about the spill nor about flat-field noise: its errors come out too small. */
const STATED_ERROR_FACTOR = 0.93;

/**
 * Light of a source as it falls on the pixels of an arm, before any flaw.
 *
 * @param shift observed over rest wavelength: (1 + redshift) / (1 + velocity of the observatory / c)
 * @returns flux units
 */
export function lightInArm(
  source: Source,
  arm: CurlewArm,
  shift: number,
  spreadFactor: number,
): Float64Array {
  const { grid, flux, sharpnessKmS } = source.spectrum;
  const missing = missingWidthKmS(LINE_SPREAD_KM_S * spreadFactor, sharpnessKmS);
  const spread = broaden(flux, missing / LIGHT_SPEED_KM_S / grid.step);
  const seen = { ...grid, lnStart: grid.lnStart + Math.log(shift) };
  const scale = magnitudeScale({ ...source.spectrum, grid: seen }, source.magnitude);
  const edges = Float64Array.from({ length: grid.length + 1 }, (_, i) =>
    Math.exp(seen.lnStart + (i - 0.5) * seen.step),
  );
  const light = rebinDensity(spread, edges, edgesFromCentres(armWavelengths(arm)));
  return light.map((value) => value * scale);
}

/** Factor that gives a spectrum its magnitude in the band all magnitudes are stated in. */
function magnitudeScale({ grid, flux }: RestSpectrum, magnitude: number): number {
  const wanted =
    fluxOfMagnitudeZero(0.5 * (MAGNITUDE_BAND.from + MAGNITUDE_BAND.to)) * 10 ** (-0.4 * magnitude);
  return wanted / meanIn(grid, flux, MAGNITUDE_BAND.from, MAGNITUDE_BAND.to);
}

export function armWavelengths(arm: CurlewArm): Float64Array {
  return Float64Array.from({ length: arm.pixels }, (_, i) => arm.firstAngstrom + i * arm.stepAngstrom);
}

/**
 * One arm of one fibre: photon and read-out noise, the sky and what its subtraction leaves, cosmic rays, and
 * the flaws of the fibre.
 *
 * @param light from `lightInArm`; zeros for a sky fibre
 */
export function observeArm(
  random: RandomStream,
  arm: CurlewArm,
  light: Float64Array,
  { exposureS, airmass, sky: brightness, flaws }: Observing,
): ObservedArm {
  const sky = skyLight(arm, brightness, flaws.spreadFactor, 0);
  const subtracted = skyLight(arm, brightness, flaws.spreadFactor, flaws.skyShiftPixels);
  const white = Float64Array.from({ length: arm.pixels + 2 }, () => random.normal());
  const centre = Math.sqrt(1 - 2 * NOISE_SPILL ** 2);
  const observed: ObservedArm = {
    flux: new Float32Array(arm.pixels),
    error: new Float32Array(arm.pixels),
    quality: new Uint8Array(arm.pixels),
    sky: new Float32Array(arm.pixels),
    lineSpread: new Float32Array(arm.pixels),
  };
  for (let i = 0; i < arm.pixels; i++) {
    const wavelength = arm.firstAngstrom + i * arm.stepAngstrom;
    const perUnit = electronsPerUnit(arm, wavelength, exposureS, airmass);
    const electrons = (Math.max(0, light[i]!) + sky[i]!) * perUnit;
    const sigma = Math.sqrt(electrons + READ_NOISE ** 2) / perUnit;
    const noise = centre * white[i + 1]! + NOISE_SPILL * (white[i]! + white[i + 2]!);
    const taken = subtracted[i]! * (1 + flaws.skyScaleError);
    observed.flux[i] =
      light[i]! * calibrationError(arm, wavelength, airmass, flaws) + sky[i]! - taken + sigma * noise;
    observed.error[i] = STATED_ERROR_FACTOR * sigma;
    observed.sky[i] = taken;
    observed.lineSpread[i] =
      (wavelength * LINE_SPREAD_KM_S * flaws.spreadFactor) / LIGHT_SPEED_KM_S / arm.stepAngstrom;
  }
  addCosmicRays(random, observed);
  return observed;
}

/** Everything multiplicative that the flux calibration gets wrong. */
function calibrationError(arm: CurlewArm, wavelength: number, airmass: number, flaws: FibreFlaws): number {
  const { amplitude, periodAngstrom, phase } = flaws.ripple;
  return (
    (arm.name === 'BLUE' ? flaws.armStep : 1) *
    (wavelength / 6500) ** flaws.tilt *
    (1 + amplitude * Math.sin((2 * Math.PI * wavelength) / periodAngstrom + phase)) *
    bandResidual(wavelength, airmass, flaws.bandError)
  );
}

function addCosmicRays(random: RandomStream, { flux, error, quality }: ObservedArm): void {
  for (const ray of drawCosmicRays(random, flux.length)) {
    for (let i = ray.pixel; i < Math.min(flux.length, ray.pixel + ray.width); i++) {
      flux[i]! += ray.height * error[i]!;
      if (ray.found) quality[i]! |= QUALITY.cosmicRay;
    }
  }
}
