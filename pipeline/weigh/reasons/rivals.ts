import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';
import { SAME_REDSHIFT_KM_S, separationKmS } from '../evidence.ts';

/** A rival this near in effective chi-square is a real alternative whatever the calibration says (3 sigma). */
const RIVAL_MARGIN = 9;
/** r below this is as often chance as not (Tonry & Davis 1979 take 4 as the end of trust). */
const TRUSTED_R = 4;
/** The correlation must prefer its own redshift by this much before it counts as disagreement. */
const CLEARLY_HIGHER = 1.5;

/** A different redshift or kind explains the data nearly as well. */
export function rival(one: Case, confidence: number, reviewConfidence: number): Reason | null {
  const other = one.runnerUp;
  if (!other) return null;
  const unsureBecauseOfIt = confidence < reviewConfidence && one.margin < 4 * RIVAL_MARGIN;
  if (one.margin >= RIVAL_MARGIN && !unsureBecauseOfIt) return null;
  return {
    word: 'rival',
    weight: 'look',
    sentence: `Rival: ${other.best.kind} at ${other.best.redshift.toFixed(4)} is ${one.margin.toFixed(1)} in chi-square behind.`,
    numbers: { margin: one.margin, redshift: other.best.redshift },
  };
}

/** Cross-correlation prefers, clearly, another redshift than the fit. */
export function methodsDisagree(one: Case, confidence: number, reviewConfidence: number): Reason | null {
  const { redshift, r, rAtAnswer } = one.secondOpinion;
  if (redshift === null || r < TRUSTED_R || r < CLEARLY_HIGHER * Math.max(rAtAnswer, 1)) return null;
  const limit = 3 * SAME_REDSHIFT_KM_S[one.best.best.kind];
  if (separationKmS(one.best.best.redshift, redshift) < limit || confidence >= reviewConfidence) return null;
  return {
    word: 'methods-disagree',
    weight: 'look',
    sentence: `The cross-correlation prefers ${redshift.toFixed(4)} (r = ${r.toFixed(1)}), the fit ${one.best.best.redshift.toFixed(4)} (r = ${rAtAnswer.toFixed(1)} there).`,
    numbers: { redshift, r, rAtAnswer },
  };
}
