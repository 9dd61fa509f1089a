import type { Spectrum } from '../decode/index.ts';
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
  const milliseconds = observedAt === null ? NaN : parseUtc(observedAt);
  const known = site !== null && raDeg !== null && decDeg !== null && Number.isFinite(milliseconds);
  if (frame !== 'topocentric' || !known || spectrum.coaddedOverNights)
    return { velocityKmS: null, source: 'unknown' };
  return { velocityKmS: barycentricVelocityKmS(milliseconds, site, raDeg, decDeg), source: 'applied-here' };
}

/**
 * Milliseconds since 1970 of an ISO 8601 UTC time, NaN when it is not one. Days from the civil calendar by
 * Hinnant's algorithm (public domain), because this folder has no clock and so no calendar of the platform.
 */
export function parseUtc(text: string): number {
  const parts = /^(\d{4})-(\d\d)-(\d\d)(?:T(\d\d):(\d\d)(?::(\d\d(?:\.\d+)?))?)?Z?$/.exec(text);
  if (!parts) return NaN;
  const [year, month, day, hour, minute, second] = parts.slice(1).map((part) => Number(part || 0));
  const y = month! <= 2 ? year! - 1 : year!;
  const era = Math.floor(y / 400);
  const yearOfEra = y - era * 400;
  const dayOfYear = Math.floor((153 * (month! + (month! > 2 ? -3 : 9)) + 2) / 5) + day! - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  const days = era * 146_097 + dayOfEra - 719_468;
  return ((days * 24 + hour!) * 60 + minute!) * 60_000 + second! * 1000;
}
