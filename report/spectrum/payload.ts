import type { Kind } from '../../templates/family.ts';

/**
 * What the page carries for one plotted spectrum, as JSON. The curves themselves are in `samples`: base64 of
 * raw-deflated bytes, one series after the other in the order `arms` (wavelength, flux, error, model, and
 * runnerUp when it has one) then `scan` (redshift, chiSquare); see quantise.ts for the bytes of one series.
 * The page's script reads this: it may only be changed together with client/unpack.ts.
 */
export interface SpectrumPayload {
  readonly arms: readonly ArmPayload[];
  readonly scan: readonly ScanPayload[];
  /** Where the lines of the best and the second answer should fall. */
  readonly marks: readonly LineMark[];
  /** Redshift and kind of each candidate, best first. */
  readonly candidates: readonly { readonly kind: Kind; readonly redshift: number }[];
  readonly samples: string;
}

/** One value range that `levels` steps are spread over. */
export interface SeriesRange {
  readonly from: number;
  readonly to: number;
  readonly levels: number;
}

export interface ArmPayload {
  readonly name: string;
  readonly length: number;
  readonly wavelength: SeriesRange;
  readonly flux: SeriesRange;
  readonly error: SeriesRange;
  readonly model: SeriesRange;
  readonly runnerUp: SeriesRange | null;
  /** Wavelength ranges not used in the fit, ångström. */
  readonly masked: readonly (readonly [number, number])[];
}

export interface ScanPayload {
  readonly kind: Kind;
  readonly length: number;
  readonly redshift: SeriesRange;
  readonly chiSquare: SeriesRange;
}

export interface LineMark {
  readonly label: string;
  /** Vacuum, observed frame as read. */
  readonly wavelength: number;
  readonly of: 'best' | 'runner-up';
}
