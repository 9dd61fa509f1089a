/** weigh: all measurements of one spectrum → its answer. */
export type {
  Answer,
  BarycentricSource,
  CandidateSummary,
  CurveArm,
  Curves,
  LineMeasurement,
  Reason,
  ReasonWeight,
  ReasonWord,
} from './answer.ts';
export { CALIBRATION } from './calibration-values.ts';
export { type Calibration, calibrated } from './calibration.ts';
export type { Case, SecondOpinion } from './case.ts';
export { noiseInflation, SAME_REDSHIFT_KM_S } from './evidence.ts';
export { curvesOf } from './curves.ts';
export { secondOpinion } from './second-opinion.ts';
export { weigh, type Weighed, type Weighing } from './weigh.ts';
