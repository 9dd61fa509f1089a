export { chiSquareCurves, type KindCurve } from './chi-square-curves.ts';
export { correlationAt, type CorrelationCurve, type CorrelationPeak } from './correlation-search.ts';
export { type Candidate, type FamilyMatch, type Match, matchFamilies } from './match-families.ts';
export { DEFAULT_MATCH_OPTIONS, type MatchOptions } from './match-options.ts';
export type { Minimum } from './minima.ts';
export { createMatchWorkspace, type MatchWorkspace } from './workspace.ts';
