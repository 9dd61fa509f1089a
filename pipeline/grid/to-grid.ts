import { median } from '../core/quantile.ts';
import type { Spectrum } from '../decode/spectrum.ts';
import { InputFault } from '../errors.ts';
import { scaleToReference } from './arm-scale.ts';
import { checkSpectrumNoise } from './exposure-noise.ts';
import type { ExposureContext } from './exposure-context.ts';
import type { Grid, GridArm, NativePixels } from './grid.ts';
import { DEFAULT_GRID_OPTIONS, type GridOptions } from './grid-options.ts';
import { smoothLevel } from './level.ts';
import { rebinToLog } from './log-rebin.ts';
import { cleanArm, LEVEL_WIDTH_KM_S, usablePixels } from './native-pixels.ts';
import { NOISE_LAGS } from './noise-check.ts';
import { observatoryToAxis } from './sky-lines.ts';

/** A shift needs structure: fewer usable pixels than this do not hold enough of any spectrum. */
const FEWEST_PIXELS = 100;
const SPEED_OF_LIGHT_KM_S = 299792.458;

/**
 * Puts a spectrum on a uniform axis in ln(wavelength): masks what is no light of the object, settles the noise,
 * rebins each arm conserving flux, and brings the arms to one level.
 *
 * @param context what the exposure says about its noise; `NO_EXPOSURE_CONTEXT` measures it from this spectrum
 * @throws InputFault `no-usable-pixels` when nothing is left, `too-few-pixels` below 100 usable pixels
 */
export function toGrid(
  spectrum: Spectrum,
  context: ExposureContext,
  options: GridOptions = DEFAULT_GRID_OPTIONS,
): Grid {
  const toAxis = observatoryToAxis(spectrum.appliedCorrectionKmS);
  const noise = settleNoise(spectrum, context, options);
  const natives = spectrum.arms.map((arm) =>
    cleanArm(arm, usablePixels(arm, options), noise.noiseFactor, toAxis, options),
  );
  const total = natives.reduce((sum, native) => sum + native.used.length, 0);
  const used = natives.reduce((sum, native) => sum + native.used.reduce((n, u) => n + u, 0), 0);
  refuseTooFew(spectrum, used);
  const { lnStart, length, arms } = layOut(natives, options.step);
  return {
    lnStart,
    step: options.step,
    length,
    arms,
    joined: join(arms, length),
    ...noise,
    noiseSource: spectrum.arms.some((arm) => arm.noiseSource === 'estimated') ? 'estimated' : 'stated',
    signalToNoisePerAngstrom: signalToNoise(natives),
    goodFraction: used / total,
  };
}

function refuseTooFew(spectrum: Spectrum, used: number): void {
  if (used >= FEWEST_PIXELS) return;
  const place = {
    file: spectrum.targetName ?? 'spectrum',
    hdu: spectrum.inputHdu,
    ...(spectrum.inputRow === null ? {} : { row: spectrum.inputRow }),
  };
  const code = used === 0 ? 'no-usable-pixels' : 'too-few-pixels';
  throw new InputFault(code, place, `usable pixels must be at least ${FEWEST_PIXELS}, got ${used}`);
}

/** The exposure's word counts first; a spectrum's own scatter may only raise its errors. */
function settleNoise(
  spectrum: Spectrum,
  context: ExposureContext,
  options: GridOptions,
): Pick<Grid, 'noiseFactor' | 'noiseCorrelation' | 'noiseFrom'> {
  if (context.noiseFactor !== null) {
    return {
      noiseFactor: context.noiseFactor,
      noiseCorrelation: context.noiseCorrelation ?? noCorrelation(),
      noiseFrom: 'exposure',
    };
  }
  const check = checkSpectrumNoise(spectrum, options);
  if (check === null) return { noiseFactor: 1, noiseCorrelation: noCorrelation(), noiseFrom: 'unmeasured' };
  return {
    noiseFactor: Math.max(1, check.factor),
    noiseCorrelation: check.correlation,
    noiseFrom: 'spectrum',
  };
}

function noCorrelation(): number[] {
  return new Array<number>(NOISE_LAGS).fill(0);
}

/** Rebins every arm that has a usable pixel and places it on the common axis. */
function layOut(
  natives: readonly NativePixels[],
  step: number,
): { lnStart: number; length: number; arms: GridArm[] } {
  const rebinned = natives
    .map((native, armIndex) => ({ native, armIndex, ...rebinUsed(native, step) }))
    .filter(({ weight }) => weight.some((w) => w > 0));
  const firstStep = Math.min(...rebinned.map((arm) => arm.firstStep));
  const endStep = Math.max(...rebinned.map((arm) => arm.firstStep + arm.flux.length));
  const window = 2 * Math.round(LEVEL_WIDTH_KM_S / SPEED_OF_LIGHT_KM_S / step / 2) + 1;
  const arms: GridArm[] = [];
  for (const { native, armIndex, firstStep: start, flux, weight } of rebinned) {
    const placed = { offset: start - firstStep, flux, weight };
    const reference = nearestArm(arms, placed);
    const scale = reference === undefined ? 1 : scaleToReference(reference, placed);
    for (let i = 0; i < flux.length; i++) {
      flux[i] = flux[i]! * scale;
      weight[i] = weight[i]! / scale ** 2;
    }
    arms.push({
      ...placed,
      armIndex,
      length: flux.length,
      level: smoothLevel(flux, weight, window),
      scale,
      native,
    });
  }
  return { lnStart: firstStep * step, length: endStep - firstStep, arms };
}

/** Rebins from the first to the last used pixel only: the axis need not hold masked ends. */
function rebinUsed(native: NativePixels, step: number): ReturnType<typeof rebinToLog> {
  const first = native.used.indexOf(1);
  const end = native.used.lastIndexOf(1) + 1;
  if (end - first < 2) return { firstStep: 0, flux: new Float64Array(0), weight: new Float64Array(0) };
  return rebinToLog(
    native.wavelengthVacuumAngstrom.subarray(first, end),
    native.flux.subarray(first, end),
    native.inverseVariance.subarray(first, end),
    step,
  );
}

/** Of the arms already placed, the one with the longest overlap. */
function nearestArm(
  arms: readonly GridArm[],
  placed: { offset: number; flux: Float64Array },
): GridArm | undefined {
  const overlap = (arm: GridArm): number =>
    Math.min(arm.offset + arm.length, placed.offset + placed.flux.length) -
    Math.max(arm.offset, placed.offset);
  return [...arms].sort((a, b) => overlap(b) - overlap(a))[0];
}

function join(arms: readonly GridArm[], length: number): Grid['joined'] {
  const flux = new Float64Array(length);
  const weight = new Float64Array(length);
  for (const arm of arms) {
    for (let i = 0; i < arm.length; i++) {
      const w = arm.weight[i]!;
      flux[arm.offset + i] = flux[arm.offset + i]! + w * arm.flux[i]!;
      weight[arm.offset + i] = weight[arm.offset + i]! + w;
    }
  }
  for (let i = 0; i < length; i++) flux[i] = weight[i]! > 0 ? flux[i]! / weight[i]! : 0;
  return { flux, weight };
}

/** Median of level / sigma over the used pixels, each scaled to one ångström. */
function signalToNoise(natives: readonly NativePixels[]): number {
  const ratios: number[] = [];
  for (const { wavelengthVacuumAngstrom: wavelength, level, inverseVariance, used } of natives) {
    for (let i = 1; i < used.length; i++) {
      const width = wavelength[i]! - wavelength[i - 1]!;
      if (used[i] === 1) ratios.push(level[i]! * Math.sqrt(inverseVariance[i]! / width));
    }
  }
  return median(ratios);
}
