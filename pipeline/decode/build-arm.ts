import { InputFault } from '../errors.ts';
import type { FaultPlace } from '../errors.ts';
import { combineMasks } from './combine-masks.ts';
import { estimateInverseVariance } from './estimate-noise.ts';
import type { FitsFile } from './fits/model.ts';
import { perAngstrom } from './flux-unit.ts';
import { headersFor } from './header-text.ts';
import type { ArmLayout, Layout } from './layout.ts';
import { FWHM_PER_SIGMA, lineSpreadSigmaKmS } from './line-spread.ts';
import { SPEED_OF_LIGHT_KM_S } from './light.ts';
import { readArray } from './read-array.ts';
import type { Arm } from './spectrum.ts';
import { airToVacuum } from './wavelength/air-vacuum.ts';
import { spectralAxisOf } from './wavelength/spectral-axis-of.ts';
import { isMonotonic, toAngstrom } from './wavelength/wavelength-numbers.ts';

/** An arm and what was noticed while reading it. */
export interface BuiltArm {
  readonly arm: Arm;
  readonly notes: readonly string[];
}

/**
 * Read one arm of one spectrum: wavelengths to vacuum ångström and rising, errors to inverse variance, masks to zero
 * weight. Pixels are kept whatever they hold; only padding of the wavelength axis (0 or not a number at either end)
 * is cut.
 *
 * @param row which spectrum, 0-based
 * @throws InputFault `wavelength-missing`, `wavelength-not-monotonic`, `shape-mismatch` and those of `readArray`
 */
export function buildArm(file: FitsFile, layout: Layout, armLayout: ArmLayout, row: number): BuiltArm {
  const place: FaultPlace = { file: file.label, hdu: armLayout.flux.hdu, row };
  const read = (source: ArmLayout['sky']): Float64Array | null =>
    source === null ? null : readArray(file, source, row, layout.rowCount);
  const fullFlux = readArray(file, armLayout.flux, row, layout.rowCount);
  const fullWave = wavelengthOf(file, armLayout, read(armLayout.wavelength), fullFlux.length, place);
  const [first, last] = filledRange(fullWave);
  const n = last - first;
  const cut = (values: Float64Array, what: string): Float64Array => {
    if (values.length !== fullFlux.length) {
      const detail = `${what} must have ${fullFlux.length} pixels like the flux, got ${values.length}`;
      throw new InputFault('shape-mismatch', place, detail);
    }
    return values.slice(first, last);
  };
  const wave = cut(fullWave, 'wavelength');
  if (n < 2 || !isMonotonic(wave)) {
    throw new InputFault('wavelength-not-monotonic', place, 'wavelengths must run one way, got others');
  }
  const isFalling = wave[1]! < wave[0]!;
  const oriented = <T extends Float64Array | Uint8Array>(values: T): T =>
    (isFalling ? values.reverse() : values) as T;
  const flux = cut(fullFlux, 'flux');
  const isPerFrequency = armLayout.fluxPer === 'hertz' || armLayout.fluxPer === 'jansky';
  if (isPerFrequency) perAngstrom(flux, wave, 'flux');

  const spreadValues = read(armLayout.spread);
  const spread = spreadValues === null ? null : cut(spreadValues, 'error');
  const usable = Uint8Array.from(flux, (value) => (Number.isFinite(value) ? 1 : 0));
  let weights = spread === null ? null : inverseVarianceOf(spread, armLayout.spreadMeaning);
  if (weights !== null && isPerFrequency) perAngstrom(weights, wave, 'inverse-variance');
  const hasWeight = usable.map((value, i) => (value !== 0 && (weights === null || weights[i]! > 0) ? 1 : 0));
  const masks = armLayout.quality.map((source) => cut(readArray(file, source, row, layout.rowCount), 'mask'));
  const { bad, notes } = combineMasks(masks, armLayout.qualityBadWhen ?? 'nonzero', hasWeight);
  const kept = hasWeight.map((value, i) => (value !== 0 && bad[i] === 0 ? 1 : 0));
  weights ??= estimateInverseVariance(flux, kept);
  const inverseVariance = weights.map((value, i) => (kept[i] === 0 || !Number.isFinite(value) ? 0 : value));

  const skyValues = read(armLayout.sky);
  const sky = skyValues === null ? undefined : oriented(cut(skyValues, 'sky'));
  const spreadSigma = lineSpreadOf(
    layout,
    armLayout,
    read(armLayout.lineSpread),
    first,
    last,
    fullFlux.length,
    wave,
  );
  const vacuum = armLayout.medium === 'air' ? wave.map(airToVacuum) : wave;
  return {
    arm: {
      name: armLayout.name,
      wavelengthVacuumAngstrom: oriented(vacuum),
      flux: oriented(flux),
      inverseVariance: oriented(inverseVariance),
      ...(spreadSigma === null ? {} : { lineSpreadSigmaKmS: oriented(spreadSigma) }),
      ...(sky === undefined ? {} : { sky }),
      noiseSource: spread === null ? 'estimated' : 'stated',
    },
    notes: armLayout.name === '' ? notes : notes.map((note) => `${armLayout.name}: ${note}`),
  };
}

/** Wavelengths in the input's medium, ångström, in pixel order; NaN where padded. */
function wavelengthOf(
  file: FitsFile,
  armLayout: ArmLayout,
  values: Float64Array | null,
  pixels: number,
  place: FaultPlace,
): Float64Array {
  if (values !== null) {
    const padded = values.map((value) => (value === 0 ? NaN : value));
    return toAngstrom(padded, {
      angstrom: armLayout.wavelengthUnitAngstrom,
      meaning: armLayout.wavelengthMeaning,
    });
  }
  for (const header of headersFor(file, armLayout.flux.hdu)) {
    const axis = spectralAxisOf(file, header, 1, pixels, place);
    if (axis !== null) return axis.wavelengthAngstrom;
  }
  throw new InputFault('wavelength-missing', place, 'a spectral axis must be in the header, got none');
}

/** First and one past last pixel with a wavelength. */
function filledRange(wave: Float64Array): readonly [number, number] {
  let first = 0;
  let last = wave.length;
  while (first < last && !Number.isFinite(wave[first])) first += 1;
  while (last > first && !Number.isFinite(wave[last - 1])) last -= 1;
  return [first, last];
}

/** 1/sigma²; 0 where the error is zero, negative or not a number. */
function inverseVarianceOf(values: Float64Array, meaning: ArmLayout['spreadMeaning']): Float64Array {
  return values.map((value) => {
    if (!(value > 0) || value === Infinity) return 0;
    const weight = meaning === 'error' ? 1 / value ** 2 : meaning === 'variance' ? 1 / value : value;
    return Number.isFinite(weight) ? weight : 0;
  });
}

function lineSpreadOf(
  layout: Layout,
  armLayout: ArmLayout,
  values: Float64Array | null,
  first: number,
  last: number,
  pixels: number,
  wave: Float64Array,
): Float64Array | null {
  if (values !== null) {
    // A resolution matrix has several rows of pixels; each is cut alike.
    const rows = Math.floor(values.length / pixels);
    const n = last - first;
    const cut = new Float64Array(rows * n);
    for (let k = 0; k < rows; k += 1) cut.set(values.subarray(k * pixels + first, k * pixels + last), k * n);
    const sigma = lineSpreadSigmaKmS(cut, armLayout.lineSpreadMeaning, wave);
    if (sigma.some(Number.isFinite)) return sigma;
  }
  const { resolvingPower } = layout;
  if (resolvingPower === undefined) return null;
  return new Float64Array(wave.length).fill(SPEED_OF_LIGHT_KM_S / (resolvingPower * FWHM_PER_SIGMA));
}
