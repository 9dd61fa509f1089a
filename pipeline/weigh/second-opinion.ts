import { correlationAt, type Match } from '../match/index.ts';
import type { Measurement } from '../measure/index.ts';
import type { SecondOpinion } from './case.ts';

/** The correlation's favourite over all families, and how it sees a given hypothesis. */
export function secondOpinion(match: Match, one: Measurement): SecondOpinion {
  let favourite: SecondOpinion['redshift'] = null;
  let r = 0;
  for (const { peaks } of match.families) {
    for (const peak of peaks) {
      if (peak.r > r) {
        r = peak.r;
        favourite = peak.redshift;
      }
    }
  }
  let heightAtAnswer = 0;
  let rAtAnswer = 0;
  for (const { family, correlations } of match.families) {
    if (family.kind !== one.kind) continue;
    const here = correlationAt(correlations, one.redshift);
    if (here && here.r > rAtAnswer) {
      rAtAnswer = here.r;
      heightAtAnswer = here.height;
    }
  }
  return { redshift: favourite, r, heightAtAnswer, rAtAnswer };
}
