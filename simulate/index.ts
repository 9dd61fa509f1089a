export { encodeExposure } from './encode-exposure.ts';
export type { ObserverVelocity } from './exposure.ts';
export {
  DEFAULT_SURVEY,
  EXPOSURES_PER_FIELD,
  MOST_FIELDS,
  type NightExposure,
  simulateNights,
  type SurveyParameters,
} from './night.ts';
export { type Makers, makersFrom } from './sources/makers.ts';
export { HARROW_FELL } from './survey/harrow-fell.ts';
export { type SimulatedTruth, truthCsv, truthOf } from './truth.ts';
