import type { Kind } from '../../templates/family.ts';
import type { RestSpectrum } from '../rest-spectrum.ts';

/** An object of known nature: what a practice night is made of and judged by. */
export interface Source {
  readonly kind: Kind;
  /** Barycentric. */
  readonly redshift: number;
  /** AB magnitude the observation scales the light to. */
  readonly magnitude: number;
  readonly spectrum: RestSpectrum;
}
