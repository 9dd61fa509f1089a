import type { Site } from '../../pipeline/decode/spectrum.ts';

/** The invented observatory. */
export const HARROW_FELL: Site = { latitudeDeg: -51.7, longitudeEastDeg: -59.3, heightM: 640 };

const DEGREE = Math.PI / 180;
/** WGS 84: equatorial radius in metres, and flattening. */
const EARTH_RADIUS_M = 6_378_137;
const FLATTENING = 1 / 298.257223563;

/** Geocentric position of a site, metres: what FITS calls OBSGEO-X, -Y, -Z. */
export function geocentric({
  latitudeDeg,
  longitudeEastDeg,
  heightM,
}: Site): readonly [number, number, number] {
  const latitude = latitudeDeg * DEGREE;
  const longitude = longitudeEastDeg * DEGREE;
  const squaredEccentricity = FLATTENING * (2 - FLATTENING);
  const normal = EARTH_RADIUS_M / Math.sqrt(1 - squaredEccentricity * Math.sin(latitude) ** 2);
  const outward = (normal + heightM) * Math.cos(latitude);
  return [
    outward * Math.cos(longitude),
    outward * Math.sin(longitude),
    (normal * (1 - squaredEccentricity) + heightM) * Math.sin(latitude),
  ];
}

/**
 * Airmass of a position in the sky: secant of the zenith distance. Good enough above 20 degrees.
 *
 * @param mjd UTC
 * @returns Infinity below the horizon
 */
export function airmassAt(mjd: number, raDeg: number, decDeg: number, site: Site = HARROW_FELL): number {
  // Mean sidereal time at Greenwich, degrees (Meeus 1998, eq 12.4, without the terms below a second).
  const sidereal = 280.46061837 + 360.98564736629 * (mjd - 51_544.5);
  const hourAngle = (sidereal + site.longitudeEastDeg - raDeg) * DEGREE;
  const latitude = site.latitudeDeg * DEGREE;
  const declination = decDeg * DEGREE;
  const cosZenith =
    Math.sin(latitude) * Math.sin(declination) +
    Math.cos(latitude) * Math.cos(declination) * Math.cos(hourAngle);
  return cosZenith > 0 ? 1 / cosZenith : Infinity;
}
