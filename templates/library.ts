import type { Family } from './family.ts';

/** Every family, prepared for a line spread on demand and kept. */
export interface FamilyLibrary {
  /** sha256 over the family files and the recipe version of the preparation. */
  readonly hash: string;
  /**
   * Families broadened to an instrument whose Gaussian line spread has this sigma (km/s, typical over the
   * spectrum). Requests are rounded to 5 per cent steps so that few versions exist; each is cached.
   */
  familiesFor(lineSpreadSigmaKmS: number): readonly Family[];
}
