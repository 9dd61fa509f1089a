import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';

/** Stated errors off by more than this either way deserve a word. */
const WRONG_NOISE_FACTOR = 1.3;
/** The families are stored at a Gaussian sigma of 25 km/s; a sharper instrument sees lines they do not have. */
const TEMPLATE_SIGMA_KM_S = 25;

/** The stated errors do not match the scatter. */
export function wrongNoise(one: Case): Reason | null {
  const factor = one.noiseFactor;
  if (one.noiseEstimated || (factor < WRONG_NOISE_FACTOR && factor > 1 / WRONG_NOISE_FACTOR)) return null;
  return {
    word: 'wrong-noise',
    weight: 'note',
    sentence: `The scatter seen is ${factor.toFixed(2)} times the stated errors.`,
    numbers: { noiseFactor: factor },
  };
}

/** Neither the file nor a profile says which frame the wavelengths are in. */
export function frameUnknown(one: Case): Reason | null {
  if (one.frame !== 'unknown') return null;
  return {
    word: 'frame-unknown',
    weight: 'note',
    sentence:
      'The wavelengths state no frame; the redshift may lack a barycentric correction of up to 30 km/s.',
    numbers: {},
  };
}

/** The spectrograph resolves finer than the templates. */
export function tooSharp(one: Case): Reason | null {
  if (!one.lineSpreadStated || one.lineSpreadSigmaKmS >= TEMPLATE_SIGMA_KM_S) return null;
  return {
    word: 'too-sharp',
    weight: 'note',
    sentence: `The line spread of ${one.lineSpreadSigmaKmS.toFixed(0)} km/s is finer than the templates' ${TEMPLATE_SIGMA_KM_S} km/s.`,
    numbers: { lineSpreadSigmaKmS: one.lineSpreadSigmaKmS },
  };
}
