import type { Frame } from '../decode/index.ts';
import type { MeasuredSpectrum } from '../measure/index.ts';
import type { LineMeasurement } from './answer.ts';
import type { Hypothesis, Posterior } from './evidence.ts';

/** The correlation's own favourite and what it says of the fit's answer. */
export interface SecondOpinion {
  /** Redshift of the highest significant peak over all families; null when there is none. */
  readonly redshift: number | null;
  /** Tonry & Davis r of that peak. */
  readonly r: number;
  /** Height and r of the correlation with the best family at the fit's redshift. */
  readonly heightAtAnswer: number;
  readonly rAtAnswer: number;
}

/** All that is known of one spectrum when the answer is weighed: what reasons and calibration read. */
export interface Case {
  readonly measured: MeasuredSpectrum;
  readonly posterior: Posterior;
  readonly best: Hypothesis;
  /** The best hypothesis that says something else; null when there is none. */
  readonly runnerUp: Hypothesis | null;
  /** Cost of the runner-up minus that of the best, in chi-square. */
  readonly margin: number;
  /** Cost of 'nothing here' minus that of the best. */
  readonly marginOverNone: number;
  /** Effective chi-square of the best refit over its degrees of freedom; known template mismatch included. */
  readonly reducedChiSquare: number;
  readonly degreesOfFreedom: number;
  readonly lines: readonly LineMeasurement[];
  readonly secondOpinion: SecondOpinion;
  readonly signalToNoisePerAngstrom: number;
  readonly goodFraction: number;
  readonly noiseFactor: number;
  readonly noiseCorrelation: readonly number[];
  readonly noiseEstimated: boolean;
  readonly frame: Frame;
  readonly lineSpreadSigmaKmS: number;
  /** Whether the line spread was stated by the input or profile. */
  readonly lineSpreadStated: boolean;
}
