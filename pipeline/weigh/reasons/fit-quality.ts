import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';

/**
 * Reduced chi-square, known mismatch already in the errors, above which a model leaves more than noise. Real
 * spectra rightly fitted reach 2 through calibration defects; 3 lost 3 per cent of right bright ones before
 * mismatch was counted.
 */
const POOR_REDUCED_CHI_SQUARE = 2.5;
const UNUSUAL_REDUCED_CHI_SQUARE = 5;
const BRIGHT_SNR = 10;

/** The best model leaves more than noise and the known template mismatch explain. */
export function poorFit(one: Case): Reason | null {
  if (one.reducedChiSquare < POOR_REDUCED_CHI_SQUARE) return null;
  return {
    word: 'poor-fit',
    weight: 'look',
    sentence: `The best model leaves a reduced chi-square of ${one.reducedChiSquare.toFixed(1)} where noise and known template mismatch explain 1.`,
    numbers: { reducedChiSquare: one.reducedChiSquare },
  };
}

/** Bright, well measured, and nothing in the families comes close. */
export function unusual(one: Case): Reason | null {
  if (one.reducedChiSquare < UNUSUAL_REDUCED_CHI_SQUARE || one.signalToNoisePerAngstrom < BRIGHT_SNR)
    return null;
  return {
    word: 'unusual',
    weight: 'look',
    sentence: `Signal-to-noise ${one.signalToNoisePerAngstrom.toFixed(0)} per ångström, yet the nearest template leaves a reduced chi-square of ${one.reducedChiSquare.toFixed(1)}.`,
    numbers: {
      signalToNoisePerAngstrom: one.signalToNoisePerAngstrom,
      reducedChiSquare: one.reducedChiSquare,
    },
  };
}

/** The search ended before the fit did. */
export function rangeEdge(one: Case): Reason | null {
  const { atEdge, kind, redshift } = one.best.best;
  if (!atEdge) return null;
  return {
    word: 'range-edge',
    weight: 'look',
    sentence: `The best fit, at ${redshift.toFixed(5)}, lies at the edge of the redshifts searched for a ${kind}.`,
    numbers: { redshift },
  };
}
