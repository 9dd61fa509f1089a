import type { Header } from './fits/model.ts';
import { cardNumber } from './header-text.ts';
import type { Site } from './spectrum.ts';

/** WGS84 ellipsoid (NIMA TR8350.2): equatorial radius in metres and flattening. */
const EQUATORIAL_RADIUS_M = 6_378_137;
const FLATTENING = 1 / 298.257223563;
const DEGREES = 180 / Math.PI;

/** Steps of the latitude iteration; each gains three digits near the surface. */
const LATITUDE_STEPS = 6;
/** Highest and lowest observatory on the ground, with room: anything else is another quantity. */
const HEIGHT_RANGE_M = [-500, 9_000] as const;

/** A position and how it is stated. */
export interface SiteReading {
  readonly site: Site;
  readonly notes: readonly string[];
}

/**
 * Where the telescope stands: OBSGEO-X/Y/Z or OBSGEO-L/B/H of the FITS standard, else cards whose keywords begin
 * with latitude and longitude stems. A longitude without a word about its sense is taken to run east.
 *
 * @param headers nearest first
 * @returns null when no position is stated
 */
export function siteOf(headers: readonly Header[]): SiteReading | null {
  for (const header of headers) {
    const [x, y, z] = ['X', 'Y', 'Z'].map((axis) => cardNumber(header, `OBSGEO-${axis}`));
    if (x != null && y != null && z != null) return { site: geodeticSite(x, y, z), notes: [] };
    const [b, l, h] = ['B', 'L', 'H'].map((axis) => cardNumber(header, `OBSGEO-${axis}`));
    if (b != null && l != null) {
      return { site: { latitudeDeg: b, longitudeEastDeg: l, heightM: h ?? 0 }, notes: [] };
    }
  }
  for (const header of headers) {
    const latitude = byStem(header, /^(SITE|OBS|TEL|GEO)?[-_ ]?LAT(ITUDE?)?$/, -90, 90);
    const longitude = byStem(header, /^(SITE|OBS|TEL|GEO)?[-_ ]?LONG?(ITUD?E?)?$/, -180, 360);
    if (latitude === null || longitude === null) continue;
    const height = byStem(
      header,
      /^(SITE|OBS|TEL|GEO)?[-_ ]?(ELEV(ATION)?|HEIGHT|ALTITUDE)$|^(SITE|OBS|GEO)[-_ ]?ALT$/,
      ...HEIGHT_RANGE_M,
    );
    const notes = ['the longitude of the site is taken to run east'];
    if (height === null) notes.push('the height of the site is not stated: 0 m assumed (below 0.001 km/s)');
    return {
      site: {
        latitudeDeg: latitude,
        longitudeEastDeg: longitude > 180 ? longitude - 360 : longitude,
        heightM: height ?? 0,
      },
      notes,
    };
  }
  return null;
}

/**
 * Geodetic position of a point near the surface of the WGS84 ellipsoid, by fixed-point iteration of the latitude
 * (Hofmann-Wellenhof, Lichtenegger & Collins 2001, GPS Theory and Practice, eq. 10.8).
 *
 * @param x towards latitude 0, longitude 0, metres
 * @param y towards latitude 0, longitude 90° east, metres
 * @param z towards the north pole, metres
 */
export function geodeticSite(x: number, y: number, z: number): Site {
  const eccentricitySquared = FLATTENING * (2 - FLATTENING);
  const distance = Math.hypot(x, y);
  let latitude = Math.atan2(z, distance * (1 - eccentricitySquared));
  let height = 0;
  for (let step = 0; step < LATITUDE_STEPS; step += 1) {
    const sine = Math.sin(latitude);
    const normal = EQUATORIAL_RADIUS_M / Math.sqrt(1 - eccentricitySquared * sine * sine);
    // The form with both sine and cosine stays exact at the poles.
    height = distance * Math.cos(latitude) + z * sine - EQUATORIAL_RADIUS_M ** 2 / normal;
    latitude = Math.atan2(z, distance * (1 - (eccentricitySquared * normal) / (normal + height)));
  }
  return {
    latitudeDeg: latitude * DEGREES,
    longitudeEastDeg: Math.atan2(y, x) * DEGREES,
    heightM: height,
  };
}

function byStem(header: Header, stem: RegExp, low: number, high: number): number | null {
  for (const key of header.keys()) {
    if (!stem.test(key)) continue;
    const value = cardNumber(header, key);
    if (value !== null && value >= low && value <= high) return value;
  }
  return null;
}
