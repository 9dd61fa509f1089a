import type { Kind } from '../../templates/family.ts';
import type { ScoredRow } from './catalogue-table.ts';
import type { Pair } from './join.ts';
import { BESIDE, type RightLimits } from './limits.ts';

const LIGHT_SPEED_KM_S = 299_792.458;

/** One answer held against what is known. */
export interface Judgement {
  readonly group: string;
  readonly kind: Kind | 'none';
  readonly answer: ScoredRow;
  /** Nothing asks for a person: users take the answer as it is. */
  readonly isAccepted: boolean;
  /** Within the limit of its kind. False where there is nothing to be found. */
  readonly isRight: boolean;
  readonly isRightKind: boolean;
  /** Within the looser limits reported beside; equal to `isRight` for galaxies. */
  readonly isRightBeside: boolean;
  /** c Δz / (1 + z), km/s; null without an answer or a truth. */
  readonly offsetKmS: number | null;
  /** Offset over stated error. */
  readonly pull: number | null;
}

/**
 * Judges a pair.
 *
 * @returns null when it cannot be judged: no catalogue row, an unsure reference, or nothing known
 */
export function judge({ truth, answer }: Pair, limits: RightLimits): Judgement | null {
  if (answer === null || !truth.isSure || truth.kind === null) return null;
  const shared = {
    group: truth.group,
    answer,
    isAccepted: !answer.needsReview && answer.redshift !== null,
  };
  if (truth.kind === 'none') {
    const nothing = { isRight: false, isRightKind: false, isRightBeside: false, offsetKmS: null, pull: null };
    return { ...shared, kind: 'none', ...nothing };
  }
  if (truth.redshift === null) return null;
  const { kind } = truth;
  const perUnit = LIGHT_SPEED_KM_S / (1 + truth.redshift);
  const offsetKmS = answer.redshift === null ? null : (answer.redshift - truth.redshift) * perUnit;
  const errorKmS = answer.redshiftError === null ? null : answer.redshiftError * perUnit;
  const isWithin = (limit: number): boolean => offsetKmS !== null && Math.abs(offsetKmS) < limit;
  const isRight = isWithin(limits(truth.group, kind));
  return {
    ...shared,
    kind,
    isRight,
    isRightKind: answer.kind === kind,
    isRightBeside:
      kind === 'galaxy'
        ? isRight
        : isWithin(
            kind === 'quasar'
              ? BESIDE.quasarKmS
              : Math.max(BESIDE.starKmS, BESIDE.starErrors * (errorKmS ?? 0)),
          ),
    offsetKmS,
    pull: offsetKmS === null || errorKmS === null || errorKmS === 0 ? null : offsetKmS / errorKmS,
  };
}
