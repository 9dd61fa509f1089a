import { median, robustSigma } from '../../pipeline/core/quantile.ts';
import { type Share, shareOf } from './binomial.ts';
import type { Judgement } from './judge.ts';

/** Counts over some of the judged answers that have something to be found. */
export interface Tally {
  readonly name: string;
  readonly count: number;
  readonly right: Share;
  readonly rightBeside: Share;
  readonly rightKind: Share;
  readonly wrong: number;
  readonly flagged: number;
  readonly accepted: Share;
  /** The number users feel: wrong ones among those nothing warned of. */
  readonly wrongAmongAccepted: Share;
  /** Of the right answers; null when there are fewer than two. */
  readonly offsetKmS: number | null;
  readonly scatterKmS: number | null;
  /** Median and robust sigma of offset over stated error: 0 and 1 when the errors are honest. */
  readonly pullMedian: number | null;
  readonly pullSigma: number | null;
}

/** @param judgements none of kind `none` */
export function tally(name: string, judgements: readonly Judgement[]): Tally {
  const right = judgements.filter(({ isRight }) => isRight);
  const accepted = judgements.filter(({ isAccepted }) => isAccepted);
  const offsets = right.flatMap(({ offsetKmS }) => (offsetKmS === null ? [] : [offsetKmS]));
  const pulls = right.flatMap(({ pull }) => (pull === null ? [] : [pull]));
  const among = (chosen: readonly Judgement[]): Share => shareOf(chosen.length, judgements.length);
  return {
    name,
    count: judgements.length,
    right: among(right),
    rightBeside: among(judgements.filter(({ isRightBeside }) => isRightBeside)),
    rightKind: among(judgements.filter(({ isRightKind }) => isRightKind)),
    wrong: judgements.length - right.length,
    flagged: judgements.filter(({ answer }) => answer.needsReview).length,
    accepted: among(accepted),
    wrongAmongAccepted: shareOf(accepted.filter(({ isRight }) => !isRight).length, accepted.length),
    offsetKmS: offsets.length < 2 ? null : median(offsets),
    scatterKmS: offsets.length < 2 ? null : robustSigma(offsets),
    pullMedian: pulls.length < 2 ? null : median(pulls),
    pullSigma: pulls.length < 2 ? null : robustSigma(pulls),
  };
}
