import { describe, expect, it } from 'vitest';
import { mjdOfIsoDate } from '../../../pipeline/decode/index.ts';
import { barycentricVelocityKmS } from '../../../pipeline/measure/barycentric.ts';

/**
 * Six cases computed with astropy 5.2.1 (`radial_velocity_correction`, ERFA epv00 ephemeris, IERS-B): site
 * longitude and latitude (deg), height (m), target RA and Dec (deg), UTC, velocity (m/s).
 */
const ASTROPY_CASES = [
  ['B1', -70.4042, -24.6272, 2635, 83.8221, -5.3911, '2015-01-15T02:30:00Z', -13730.6447],
  ['B2', -155.4747, 19.8263, 4145, 10.6847, 41.269, '2012-09-20T10:00:00Z', 12205.8454],
  ['B3', -17.889, 28.7569, 2382, 187.7059, 12.3911, '2010-04-01T00:00:00Z', -3891.4624],
  ['B4', -105.8203, 32.7803, 2788, 266.4168, -29.0078, '2008-06-21T06:15:30Z', -1495.0909],
  ['B5', 149.0661, -31.277, 1164, 0, -89.9, '2018-12-25T12:00:00Z', 689.4909],
  ['B6', 0, 51.4779, 46, 269.4521, 4.6934, '2000-01-01T12:00:00Z', 5067.9062],
] as const;

describe('barycentricVelocityKmS()', () => {
  it.each(ASTROPY_CASES)(
    'agrees with astropy within 1.5 m/s in case %s',
    (_name, longitudeEastDeg, latitudeDeg, heightM, ra, dec, utc, expectedMS) => {
      const site = { latitudeDeg, longitudeEastDeg, heightM };
      const velocityMS = 1000 * barycentricVelocityKmS(mjdOfIsoDate(utc)!, site, ra, dec);
      expect(Math.abs(velocityMS - expectedMS)).toBeLessThan(1.5);
    },
  );
});
