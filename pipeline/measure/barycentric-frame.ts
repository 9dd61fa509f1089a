import { mjdOfIsoDate, type Spectrum } from '../decode/index.ts';
import { barycentricVelocityKmS } from './barycentric.ts';

/** What is to be done about the motion of the observatory, and how that is known. */
export interface BarycentricFrame {
  /** Velocity to apply (source `applied-here`) or already in the wavelengths; null when not known. */
  readonly velocityKmS: number | null;
  readonly source: 'applied-here' | 'already-applied' | 'unknown';
}

/**
 * Decides from what the input states. Topocentric wavelengths are corrected when time, position and site are
 * all known. Heliocentric ones count as corrected: the Sun moves by at most 0.016 km/s about the barycentre
 * (common practice). Nothing is ever assumed to be zero in silence: what cannot be told is `unknown`.
 */
export function barycentricFrame(spectrum: Spectrum): BarycentricFrame {
  const { frame, site, raDeg, decDeg, observedAt } = spectrum;
  if (frame === 'barycentric' || frame === 'heliocentric') {
    return { velocityKmS: spectrum.appliedCorrectionKmS, source: 'already-applied' };
  }
  const mjd = observedAt === null ? null : mjdOfIsoDate(observedAt);
  const known = site !== null && raDeg !== null && decDeg !== null && mjd !== null;
  if (frame !== 'topocentric' || !known || spectrum.coaddedOverNights)
    return { velocityKmS: null, source: 'unknown' };
  return { velocityKmS: barycentricVelocityKmS(mjd, site, raDeg, decDeg), source: 'applied-here' };
}
