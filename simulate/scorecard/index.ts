export { readCatalogue, type ScoredRow } from './catalogue-table.ts';
export { limitsWith, type RightLimits } from './limits.ts';
export { scoreCatalogue, type Scorecard } from './score-catalogue.ts';
export { scorecardText } from './scorecard-text.ts';
export { readTruth, type TruthRow } from './truth-table.ts';
