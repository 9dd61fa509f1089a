import { Body, BaryState, MakeTime, Observer, ObserverState, type StateVector } from 'astronomy-engine';
import type { Site } from '../decode/spectrum.ts';

const AU_KM = 149_597_870.7;
const DAY_S = 86_400;
/** The library counts days of UT from 2000-01-01 12:00. */
const MJD_OF_J2000 = 51_544.5;
const SPEED_OF_LIGHT_KM_S = 299_792.458;
/** GM over c² (km): Sun, IAU 2015 nominal; Earth, IERS 2010. */
const SUN_GM_OVER_C2_KM = 1.476625;
const EARTH_GM_OVER_C2_KM = 4.435028e-6;

/**
 * Radial velocity of the observatory towards a target, as a redshift measure: with z_obs measured at the
 * telescope, 1 + z = (1 + z_obs)(1 + v/c) is the redshift seen from the barycentre of the solar system
 * (Wright & Eastman 2014, PASP 126, 838; never a sum). Includes Earth's orbit and rotation, special
 * relativity and the potential of Sun and Earth; no proper motion or parallax (below 1 m/s for survey targets).
 * Good to 1.5 m/s against checks made with the ERFA ephemeris.
 *
 * @param mjdUtc mid-exposure, Modified Julian Date, UTC; UT1 − UTC (< 0.9 s) costs at most 0.02 m/s
 * @returns v in km/s, positive when the observatory moves towards the target
 */
export function barycentricVelocityKmS(mjdUtc: number, site: Site, raDeg: number, decDeg: number): number {
  const time = MakeTime(mjdUtc - MJD_OF_J2000);
  const earth = BaryState(Body.Earth, time);
  const sun = BaryState(Body.Sun, time);
  // The library's heights are metres; its frame here is J2000 (ofdate = false), ICRS to 0.02 arcsec.
  const observer = ObserverState(
    time,
    new Observer(site.latitudeDeg, site.longitudeEastDeg, site.heightM),
    false,
  );
  const velocity = velocitySum(earth, observer);
  const ra = (raDeg * Math.PI) / 180;
  const dec = (decDeg * Math.PI) / 180;
  const toTarget = [Math.cos(dec) * Math.cos(ra), Math.cos(dec) * Math.sin(ra), Math.sin(dec)] as const;
  const beta = velocity.map((v) => v / SPEED_OF_LIGHT_KM_S);
  const along = beta[0]! * toTarget[0] + beta[1]! * toTarget[1] + beta[2]! * toTarget[2];
  const betaSquared = beta.reduce((sum, b) => sum + b * b, 0);
  const gamma = 1 / Math.sqrt(1 - betaSquared);
  const sunDistance = AU_KM * Math.hypot(earth.x - sun.x, earth.y - sun.y, earth.z - sun.z);
  const earthDistance = AU_KM * Math.hypot(observer.x, observer.y, observer.z);
  const potential = SUN_GM_OVER_C2_KM / sunDistance + EARTH_GM_OVER_C2_KM / earthDistance;
  return SPEED_OF_LIGHT_KM_S * (gamma * (1 + along) * (1 + potential) - 1);
}

function velocitySum(a: StateVector, b: StateVector): number[] {
  const scale = AU_KM / DAY_S;
  return [(a.vx + b.vx) * scale, (a.vy + b.vy) * scale, (a.vz + b.vz) * scale];
}
