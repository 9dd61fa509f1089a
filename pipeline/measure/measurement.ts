import type { Family, Kind } from '../../templates/family.ts';
import type { Refit } from './refit.ts';
import type { RefitPixels } from './refit-pixels.ts';

/** One redshift hypothesis after its physical refit. */
export interface Measurement {
  readonly kind: Kind;
  readonly family: Family;
  /** Redshift in the frame of the wavelengths as read. */
  readonly redshift: number;
  /** Formal 1-sigma of c·Δz/(1+z) in km/s from the chi-square curvature; null when not refined or flat. */
  readonly sigmaKmS: number | null;
  readonly atEdge: boolean;
  readonly refined: boolean;
  readonly refit: Refit;
}

/** Everything the refit found out about one spectrum. */
export interface MeasuredSpectrum {
  readonly pixels: RefitPixels;
  /** In no particular order of merit: weighing is the next stage's business. */
  readonly measurements: readonly Measurement[];
  /** Chi-square of a smooth polynomial per arm alone: what 'there is no object here' leaves. */
  readonly emptyChiSquare: number;
  /** Free parameters of that polynomial. */
  readonly emptyFreedom: number;
}
