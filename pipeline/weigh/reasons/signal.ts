import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';
import { emissionLines } from './emission.ts';

/** Below this median signal-to-noise per ångström, with no line, nothing was seen. */
const NO_LIGHT_SNR = 0.3;
/** A single feature this significant is light (a chance peak among a few thousand pixels reaches 4). */
const A_LINE_SIGMA = 5;
/** Continua fainter than this rarely decide a redshift alone (completeness falls below one half). */
const FAINT_SNR = 2;

/** Nothing above the noise: neither a continuum nor a line, and 'nothing here' explains the data as well. */
export function noLight(one: Case): Reason | null {
  const strongest = emissionLines(one)[0]?.signalToNoise ?? 0;
  const snr = one.signalToNoisePerAngstrom;
  if (snr > NO_LIGHT_SNR || strongest > A_LINE_SIGMA || one.posterior.probabilityNone < 0.05) return null;
  return {
    word: 'no-light',
    weight: 'blocks',
    sentence: `Nothing above the noise: signal-to-noise ${snr.toFixed(2)} per ångström and no line above ${A_LINE_SIGMA} sigma.`,
    numbers: { signalToNoisePerAngstrom: snr, strongestLine: strongest },
  };
}

/** Too little signal for an answer this unsure. */
export function faint(one: Case, confidence: number, reviewConfidence: number): Reason | null {
  const snr = one.signalToNoisePerAngstrom;
  if (confidence >= reviewConfidence || snr >= FAINT_SNR) return null;
  return {
    word: 'faint',
    weight: 'look',
    sentence: `Signal-to-noise ${snr.toFixed(2)} per ångström leaves the answer at a confidence of ${confidence.toFixed(2)}.`,
    numbers: { signalToNoisePerAngstrom: snr, confidence },
  };
}
