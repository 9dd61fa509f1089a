import type { Case } from './case.ts';
import { SAME_REDSHIFT_KM_S, separationKmS } from './evidence.ts';
import { emissionLines } from './reasons/emission.ts';
import { loneLine } from './reasons/line-evidence.ts';

/** Margins beyond this add nothing to what is known: the data the calibration was fitted on end there. */
const LARGEST_MARGIN = 2_000;

/**
 * The numbers the calibration reads; all finite. They are stored with the answer, so that a new calibration
 * needs no new measurement.
 */
export function featuresOf(one: Case): Record<string, number> {
  const { best, secondOpinion } = one;
  const limit = SAME_REDSHIFT_KM_S[best.best.kind];
  const agrees =
    secondOpinion.redshift !== null && separationKmS(best.best.redshift, secondOpinion.redshift) < 3 * limit;
  const emission = emissionLines(one);
  return {
    lnMargin: Math.log1p(bounded(one.margin)),
    lnMarginOverNone: Math.log1p(bounded(one.marginOverNone)),
    lnReducedChiSquare: Math.log(Math.min(Math.max(one.reducedChiSquare, 0.2), 50)),
    lnSignalToNoise: Math.log(Math.min(Math.max(one.signalToNoisePerAngstrom, 0.05), 200)),
    correlationAgrees: agrees ? 1 : 0,
    correlationR: Math.min(Math.max(secondOpinion.rAtAnswer, 0), 20),
    emissionLines: Math.min(emission.length, 6),
    lnStrongestLine: Math.log1p(Math.max(0, ...emission.map((l) => Math.min(l.signalToNoise, 100)))),
    restsOnOneLine: loneLine(one) ? 1 : 0,
    goodFraction: one.goodFraction,
    noiseEstimated: one.noiseEstimated ? 1 : 0,
  };
}

function bounded(margin: number): number {
  return Math.min(Math.max(margin, 0), LARGEST_MARGIN);
}
