import type { LogGrid } from '../family.ts';
import type { StarGroup } from '../stars/parameters.ts';

/** One synthetic stellar spectrum. */
export interface StarModel {
  readonly name: string;
  readonly group: StarGroup;
  /** Effective temperature, K. */
  readonly temperature: number;
  /** log10 of the surface gravity, cm s⁻². */
  readonly logGravity: number;
  /** [M/H], dex. */
  readonly metallicity: number;
  /** Surface flux density per unit of `flux`, erg s⁻¹ cm⁻² Å⁻¹. */
  readonly scale: number;
  /** Flux density per ångström, mean 1, Gaussian width `STORED_SIGMA_KM_S`. */
  readonly flux: Float32Array;
}

/** All stellar models, on one grid. */
export interface StarGrid {
  readonly grid: LogGrid;
  readonly models: readonly StarModel[];
}
