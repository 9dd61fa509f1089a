import { expect, it } from 'vitest';
import { airmassAt, geocentric, HARROW_FELL } from '../../../simulate/survey/harrow-fell.ts';

it('geocentric() agrees with astropy 5.2.1, EarthLocation.from_geodetic(-59.3, -51.7, 640 m)', () => {
  const [x, y, z] = geocentric(HARROW_FELL);
  expect(x).toBeCloseTo(2022570.137961857, 4);
  expect(y).toBeCloseTo(-3406396.3411820605, 4);
  expect(z).toBeCloseTo(-4982686.455131713, 4);
});

// astropy 5.2.1, AltAz.secz. It precesses the ICRS positions by 14 years, up to 0.2 degrees: 1e-2 in sec z here.
it.each([
  [57000.2, 85, -28, 1.0950555764722407],
  [58000.05, 330, -60, 1.0496386651374374],
])('airmassAt(%f, %f, %f) is the secant of the zenith distance', (mjd, ra, dec, airmass) => {
  expect(Math.abs(airmassAt(mjd, ra, dec) - airmass)).toBeLessThan(0.01);
});

it('a position below the horizon has no airmass', () => {
  // Altitude −25.2 degrees by astropy.
  expect(airmassAt(57_100.9, 200, 10)).toBe(Infinity);
});
