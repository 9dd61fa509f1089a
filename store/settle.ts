import type { Kind } from '../templates/family.ts';
import type { VerdictWord } from './contract.ts';

/** What settling looks at: the program's answer and the last verdict. */
export interface SettleInput {
  readonly kind: Kind | null;
  readonly redshift: number | null;
  readonly needsReview: boolean;
  readonly verdict: VerdictWord | null;
  /** What the verdict says; for `take-candidate` the candidate's values at the time. */
  readonly verdictKind: Kind | null;
  readonly verdictRedshift: number | null;
}

export interface Settled {
  readonly redshift: number | null;
  readonly kind: Kind | null;
  readonly by: 'program' | 'reviewer' | 'disputed';
}

/**
 * What users of the catalogue should take: the program's answer unless a verdict overrules it.
 *
 * No redshift when the answer is flagged and nobody has looked, when a reviewer asked for a second opinion
 * (disputed), or when a reviewer found none to be had.
 */
export function settle(input: SettleInput): Settled {
  const { kind, redshift, verdictKind, verdictRedshift } = input;
  switch (input.verdict) {
    case null:
      return input.needsReview
        ? { redshift: null, kind: null, by: 'program' }
        : { redshift, kind, by: 'program' };
    case 'agree':
      return { redshift, kind, by: 'reviewer' };
    case 'take-candidate':
    case 'set-redshift':
      return { redshift: verdictRedshift, kind: verdictKind ?? kind, by: 'reviewer' };
    case 'set-kind':
      return { redshift: verdictRedshift ?? redshift, kind: verdictKind, by: 'reviewer' };
    case 'no-redshift':
    case 'bad-data':
    case 'two-objects':
      return { redshift: null, kind: null, by: 'reviewer' };
    case 'second-opinion':
      return { redshift: null, kind: null, by: 'disputed' };
  }
}
