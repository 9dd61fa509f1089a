/** One emission or absorption line measured at a fitted redshift. */
export interface LineMeasurement {
  /** Ion and rounded wavelength in common notation, e.g. `[O III] 5008`. */
  readonly name: string;
  readonly wavelengthRestVacuumAngstrom: number;
  readonly wavelengthObservedAngstrom: number;
  /** Flux in input unit × ångström; negative = absorption. */
  readonly flux: number;
  readonly fluxError: number;
  /** Rest-frame equivalent width, ångström, positive in emission; null where the continuum is not above noise. */
  readonly equivalentWidthAngstrom: number | null;
  readonly signalToNoise: number;
}
