import type { Kind } from '../../templates/family.ts';
import type { LineMeasurement } from '../measure/index.ts';

export type { LineMeasurement } from '../measure/index.ts';

/** Why a fit is flagged. `blocks` and `look` ask for a person, `note` does not. */
export type ReasonWord =
  | 'unreadable'
  | 'no-light'
  | 'faint'
  | 'rival'
  | 'lone-line'
  | 'methods-disagree'
  | 'poor-fit'
  | 'gaps'
  | 'range-edge'
  | 'sky-line'
  | 'impossible-lines'
  | 'wrong-noise'
  | 'frame-unknown'
  | 'too-sharp'
  | 'repeat-clash'
  | 'fibre-pattern'
  | 'unusual'
  | 'over-limits';

export type ReasonWeight = 'blocks' | 'look' | 'note';

export interface Reason {
  readonly word: ReasonWord;
  readonly weight: ReasonWeight;
  /** One plain sentence with its numbers. */
  readonly sentence: string;
  readonly numbers: Readonly<Record<string, number>>;
}

/** One redshift hypothesis after the refit. */
export interface CandidateSummary {
  readonly kind: Kind;
  readonly family: string;
  readonly redshift: number;
  /** 1-sigma; null when the curvature does not give one. */
  readonly redshiftError: number | null;
  /** Of the refit on native pixels. */
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  /** Posterior probability among all candidates and 'none', before calibration. */
  readonly probability: number;
  readonly correlationPeak: number;
  readonly correlationR: number;
}

export type BarycentricSource = 'applied-here' | 'already-applied' | 'unknown';

/** What the program concludes about one spectrum, and what it rests on. Missing = null. */
export interface Answer {
  readonly kind: Kind | null;
  readonly family: string | null;
  /** Barycentric. */
  readonly redshift: number | null;
  readonly redshiftError: number | null;
  /** Stars only: c·z. */
  readonly velocityKmS: number | null;
  readonly velocityErrorKmS: number | null;
  readonly confidence: number;
  readonly confidenceWithoutPrior: number;
  readonly probabilityGalaxy: number;
  readonly probabilityQuasar: number;
  readonly probabilityStar: number;
  readonly probabilityNone: number;
  readonly needsReview: boolean;
  readonly reasons: readonly Reason[];
  readonly runnerUpRedshift: number | null;
  readonly runnerUpKind: Kind | null;
  readonly runnerUpConfidence: number | null;
  readonly correlationPeak: number | null;
  readonly correlationR: number | null;
  readonly chiSquare: number | null;
  readonly degreesOfFreedom: number | null;
  readonly chiSquareMargin: number | null;
  readonly signalToNoisePerAngstrom: number | null;
  readonly goodFraction: number;
  readonly noiseFactor: number;
  readonly noiseCorrelation: number;
  readonly linesDetected: number;
  readonly strongestLineSnr: number | null;
  readonly barycentricCorrectionKmS: number | null;
  readonly barycentricSource: BarycentricSource;
  /** Names the calibration behind `confidence`; null when there is no confidence to calibrate. */
  readonly calibrationId: string | null;
  readonly candidates: readonly CandidateSummary[];
  readonly lines: readonly LineMeasurement[];
  /** What the calibration reads: named numbers, all finite. */
  readonly features: Readonly<Record<string, number>>;
}

/** What a page needs to draw one spectrum; all arrays of a group have equal length. */
export interface Curves {
  readonly arms: readonly CurveArm[];
  /** Chi-square against redshift, thinned, per kind. */
  readonly scan: readonly {
    readonly kind: Kind;
    readonly redshift: Float32Array;
    readonly chiSquare: Float32Array;
  }[];
}

export interface CurveArm {
  readonly name: string;
  /** Vacuum, observed frame as read. */
  readonly wavelengthVacuumAngstrom: Float32Array;
  readonly flux: Float32Array;
  readonly error: Float32Array;
  /** 1 = used in the fit. */
  readonly used: Uint8Array;
  readonly model: Float32Array;
  /** Best model of the runner-up; empty when there is none. */
  readonly runnerUpModel: Float32Array;
}
