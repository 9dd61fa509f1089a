import type { PhysicsTables, StarLines } from '../physics/tables.ts';
import { starNamed } from './parameters.ts';
import type { StarParameters } from './parameters.ts';
import { synthesizeStar } from './synthesize-star.ts';

/** A star as the family file holds it. */
export interface StoredStar {
  readonly parameters: StarParameters;
  /** On STORED_GRID, mean 1. */
  readonly flux: Float32Array;
  /** Mean surface flux density, erg s^-1 cm^-2 angstrom^-1: multiply `flux` by it. */
  readonly scale: number;
}

/** Splits a spectrum into its mean and the spectrum of mean 1. */
export function toStoredStar(parameters: StarParameters, surfaceFlux: Float32Array): StoredStar {
  const scale = surfaceFlux.reduce((sum, value) => sum + value, 0) / surfaceFlux.length;
  return { parameters, flux: surfaceFlux.map((value) => value / scale), scale };
}

/**
 * Computes one star of the grid again, as it was stored: for verifying a family file.
 * @throws RangeError when the grid has no star of that name.
 */
export function rebuildModel(name: string, tables: PhysicsTables, lines: StarLines): StoredStar {
  const parameters = starNamed(name);
  return toStoredStar(parameters, synthesizeStar(parameters, tables, lines));
}
