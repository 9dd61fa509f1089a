/** How the flux errors of an arm came to be known. */
export type NoiseSource = 'stated' | 'estimated';

/** Where the wavelength axis is at rest. `unknown`: neither the file nor a profile says. */
export type Frame = 'topocentric' | 'geocentric' | 'heliocentric' | 'barycentric' | 'unknown';

/** What a fibre was pointed at. */
export type Role = 'target' | 'sky' | 'calibration';

/**
 * One contiguous detector's worth of one spectrum. All arrays have the same length n >= 1 and run along
 * increasing wavelength. Values are as the input gave them: bad pixels are kept and marked, never removed.
 */
export interface Arm {
  /** Short name from the input, e.g. `blue`; empty when the spectrum has one arm. */
  readonly name: string;
  /** Pixel centres, vacuum, observed frame as stated by `Spectrum.frame`, in ångström. */
  readonly wavelengthVacuumAngstrom: Float64Array;
  /** Flux density per ångström, in the input's own unit; may hold NaN. */
  readonly flux: Float64Array;
  /** 1/sigma², in 1/flux²; 0 = carries no information (masked, missing or not finite in the input). */
  readonly inverseVariance: Float64Array;
  /** Gaussian sigma of the line spread at each pixel, km/s; absent when the input and profile do not say. */
  readonly lineSpreadSigmaKmS?: Float64Array;
  /** The sky that was subtracted, in the unit of `flux`; absent when the input has none. */
  readonly sky?: Float64Array;
  readonly noiseSource: NoiseSource;
}

/** Geodetic position of the telescope (WGS84). */
export interface Site {
  readonly latitudeDeg: number;
  readonly longitudeEastDeg: number;
  readonly heightM: number;
}

/** One spectrum of one target in one exposure (or one co-add), as read. */
export interface Spectrum {
  /** Position in the input: HDU index (0 = primary) and row (0-based; null when the HDU holds one spectrum). */
  readonly inputHdu: number;
  readonly inputRow: number | null;
  readonly arms: readonly Arm[];
  readonly frame: Frame;
  /** Set when the wavelengths already carry a barycentric or heliocentric correction whose size is stated, km/s. */
  readonly appliedCorrectionKmS: number | null;
  /** Mid-exposure, ISO 8601 UTC; null when not stated. */
  readonly observedAt: string | null;
  readonly exposureS: number | null;
  /** True when the input is a co-add of exposures spread over more than one night. */
  readonly coaddedOverNights: boolean;
  readonly site: Site | null;
  /** ICRS, degrees; null when not stated. */
  readonly raDeg: number | null;
  readonly decDeg: number | null;
  readonly targetName: string | null;
  readonly field: string | null;
  readonly exposureId: string | null;
  readonly fibre: number | null;
  readonly role: Role;
  readonly targetClass: string | null;
  readonly magnitude: number | null;
  readonly magnitudeBand: string | null;
  /** What the reader noticed and a person may want to know, in plain words. */
  readonly notes: readonly string[];
}
