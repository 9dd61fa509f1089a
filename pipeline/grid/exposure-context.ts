/**
 * What the spectra of one exposure say together about its noise. Measured once per exposure from its sky
 * fibres (or absent), handed to every measurement of that exposure.
 */
export interface ExposureContext {
  /** Stated errors × factor = scatter seen; null when the exposure has no spectra that can tell. */
  readonly noiseFactor: number | null;
  /** Autocorrelation of normalised noise at lags 1..6; null likewise. */
  readonly noiseCorrelation: readonly number[] | null;
  /** How many spectra that rests on. */
  readonly spectraUsed: number;
}

/** For a spectrum measured on its own. */
export const NO_EXPOSURE_CONTEXT: ExposureContext = {
  noiseFactor: null,
  noiseCorrelation: null,
  spectraUsed: 0,
};
