import type { LogGrid } from '../family.ts';

/** One stored population: its name and its light before any velocity dispersion or dust. */
export interface Population {
  readonly name: string;
  /** Age in 10⁹ years. */
  readonly age: number;
  readonly flux: Float32Array;
}

/** All populations, on one grid. */
export interface PopulationSet {
  readonly grid: LogGrid;
  readonly populations: readonly Population[];
}
