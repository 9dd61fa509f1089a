import type { Kind } from '../../templates/family.ts';

/** What a caller may change about the search. */
export interface MatchOptions {
  /** Relative 1-sigma mismatch between templates and real objects, of the local flux, in every family alike. */
  readonly mismatch: number;
  /** Highest order of each arm's additive polynomial, for an arm over the full optical range. */
  readonly polynomialOrder: number;
  /** Smallest part of the weight that a family's grid must cover for a redshift to be tried. */
  readonly leastCovered: number;
  /** Deepest separate minima kept per family. */
  readonly minimaPerFamily: Readonly<Record<Kind, number>>;
  /** Most candidates kept per refit set: several families may share one. */
  readonly candidatesPerRefitSet: Readonly<Record<Kind, number>>;
  /** Minima closer than this are one, km/s. */
  readonly separationKmS: Readonly<Record<Kind, number>>;
  /** Best peaks of the cross-correlation kept per family, beside the minima. */
  readonly correlationPeaks: number;
}

export const DEFAULT_MATCH_OPTIONS: MatchOptions = {
  // Results do not depend on it between 0 and 5 per cent; it keeps the ranking sane at high signal-to-noise.
  mismatch: 0.02,
  polynomialOrder: 3,
  leastCovered: 0.3,
  minimaPerFamily: { star: 2, galaxy: 12, quasar: 4 },
  candidatesPerRefitSet: { star: 4, galaxy: 16, quasar: 24 },
  // Three expected errors of a faint object of the kind; a star's rivals live within 1,000 km/s.
  separationKmS: { star: 150, galaxy: 600, quasar: 1500 },
  correlationPeaks: 2,
};
