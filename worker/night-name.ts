const HOUR_MS = 3_600_000;
const DEGREES_PER_HOUR = 15;

/**
 * The observing night of an exposure: the local date of the noon before it, so that one night has one name.
 * Local time is mean solar time of the longitude, which needs no time-zone tables.
 *
 * @param observedAt ISO 8601 UTC
 * @param longitudeEastDeg of the telescope
 * @returns YYYY-MM-DD, or null when the time cannot be read
 */
export function observingNight(observedAt: string, longitudeEastDeg: number): string | null {
  const utc = Date.parse(/[zZ]|[+-]\d\d:?\d\d$/.test(observedAt) ? observedAt : `${observedAt}Z`);
  if (Number.isNaN(utc)) return null;
  const sinceNoon = utc + (longitudeEastDeg / DEGREES_PER_HOUR) * HOUR_MS - 12 * HOUR_MS;
  return new Date(sinceNoon).toISOString().slice(0, 10);
}
