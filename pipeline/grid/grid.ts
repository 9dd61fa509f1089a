import type { NoiseSource } from '../decode/spectrum.ts';

/** What the grid stage found fit to use among an arm's own pixels; all arrays have the arm's length. */
export interface NativePixels {
  readonly wavelengthVacuumAngstrom: Float64Array;
  /** As read. */
  readonly flux: Float64Array;
  /** 1 = takes part in the measurement. */
  readonly used: Uint8Array;
  /** 1/sigma² after the noise check and the atmosphere's share; 0 where not used. */
  readonly inverseVariance: Float64Array;
  /** Smooth flux level (running median), the scale of relative errors; finite everywhere. */
  readonly level: Float64Array;
  /** Line spread of each pixel, Gaussian sigma in km/s, when the input says. */
  readonly lineSpreadSigmaKmS?: Float64Array;
}

/** One arm on the common axis: pixel i of the arm is pixel offset + i of the axis. */
export interface GridArm {
  /** Place of the arm in `Spectrum.arms`. */
  readonly armIndex: number;
  readonly offset: number;
  readonly length: number;
  /** Mean flux density of each pixel times `scale`; 0 where weight is 0. */
  readonly flux: Float64Array;
  /** Information of each pixel: 1/sigma² of `flux`; 0 = masked. */
  readonly weight: Float64Array;
  /** Running median of `flux`; finite everywhere. */
  readonly level: Float64Array;
  /** Factor that brings the arm to the level of the first arm where they overlap; 1 when it cannot be told. */
  readonly scale: number;
  readonly native: NativePixels;
}

/** A spectrum on a uniform axis in ln(wavelength): pixel i is centred at exp(lnStart + i × step), observed frame. */
export interface Grid {
  /** A whole multiple of `step`, so that lags against families are the same for all spectra. */
  readonly lnStart: number;
  readonly step: number;
  readonly length: number;
  /** At least one; arms without a usable pixel are left out. */
  readonly arms: readonly GridArm[];
  /** All arms in one: inverse-variance mean where they overlap. For the classic correlation and for plots. */
  readonly joined: { readonly flux: Float64Array; readonly weight: Float64Array };
  /** Stated errors × factor = scatter seen; already applied to every weight here. */
  readonly noiseFactor: number;
  /** Autocorrelation of the normalised noise on native pixels at lags 1..6; zeros when it could not be measured. */
  readonly noiseCorrelation: readonly number[];
  /** Where `noiseFactor` comes from. */
  readonly noiseFrom: 'exposure' | 'spectrum' | 'unmeasured';
  /** `estimated` when any arm's errors are an estimate. */
  readonly noiseSource: NoiseSource;
  /** Median over the used pixels, observed frame. */
  readonly signalToNoisePerAngstrom: number;
  /** Used native pixels / all native pixels. */
  readonly goodFraction: number;
}
