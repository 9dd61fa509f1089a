import { median } from '../core/quantile.ts';
import type { Spectrum } from '../decode/spectrum.ts';
import { type ExposureContext, NO_EXPOSURE_CONTEXT } from './exposure-context.ts';
import { DEFAULT_GRID_OPTIONS, type GridOptions } from './grid-options.ts';
import { usablePixels } from './native-pixels.ts';
import { checkNoise, joinNoiseChecks, NOISE_LAGS, type NoiseCheck } from './noise-check.ts';
import { maskSkyLines, observatoryToAxis } from './sky-lines.ts';

/** Fewer sky spectra than this cannot outvote one bad fibre. */
const FEWEST_SPECTRA = 3;

/** Noise check of one spectrum over all its arms; null when it is too bright or too short to tell. */
export function checkSpectrumNoise(spectrum: Spectrum, options: GridOptions): NoiseCheck | null {
  const toAxis = observatoryToAxis(spectrum.appliedCorrectionKmS);
  return joinNoiseChecks(
    spectrum.arms.map((arm) => {
      const used = usablePixels(arm, options);
      maskSkyLines(used, arm.wavelengthVacuumAngstrom, options.skyLines, toAxis);
      return checkNoise(
        arm.flux,
        Float64Array.from(used, (u, i) => (u === 1 ? arm.inverseVariance[i]! : 0)),
      );
    }),
  );
}

/**
 * What the sky spectra of one exposure say about its noise: medians over the spectra.
 *
 * @param spectra of one exposure that hold no object (role `sky`), any number
 * @returns NO_EXPOSURE_CONTEXT's nulls when fewer than 3 spectra can tell
 */
export function exposureContext(
  spectra: readonly Spectrum[],
  options: GridOptions = DEFAULT_GRID_OPTIONS,
): ExposureContext {
  const checks = spectra
    .map((spectrum) => checkSpectrumNoise(spectrum, options))
    .filter((check) => check !== null);
  if (checks.length < FEWEST_SPECTRA) return { ...NO_EXPOSURE_CONTEXT, spectraUsed: checks.length };
  return {
    noiseFactor: median(checks.map((check) => check.factor)),
    noiseCorrelation: Array.from({ length: NOISE_LAGS }, (_, k) =>
      median(checks.map((check) => check.correlation[k]!)),
    ),
    spectraUsed: checks.length,
  };
}
