/** measure: candidates → measurements, on the native pixels. */
export { barycentricVelocityKmS } from './barycentric.ts';
export { type BarycentricFrame, barycentricFrame } from './barycentric-frame.ts';
export type { LineMeasurement } from './line-measurement.ts';
export { measureLines } from './lines.ts';
export { DEFAULT_ECONOMY, type Economy, measureCandidates, type Proposal } from './measure-candidates.ts';
export type { MeasuredSpectrum, Measurement } from './measurement.ts';
export type { Refit } from './refit.ts';
export { type NativeArm, type RefitPixels, refitPixels } from './refit-pixels.ts';
export { REST_LINES, type RestLine } from './rest-lines.ts';
