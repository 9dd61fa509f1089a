import { LIGHT_SPEED_KM_S } from '../physics/constants.ts';

/** Madau 1995 (ApJ 441, 18), eq 15: wavelength (Å) and strength of the lines of the Lyman forest. */
const FOREST: readonly { readonly wavelength: number; readonly strength: number }[] = [
  { wavelength: 1215.67, strength: 0.0036 },
  { wavelength: 1025.72, strength: 0.0017 },
  { wavelength: 972.537, strength: 0.0011846 },
  { wavelength: 949.743, strength: 0.000941 },
];

/** Exponent of the growth of the forest with 1+z (Madau 1995, eq 15). */
const FOREST_GROWTH = 3.46;

/** The Lyman limit, ångström. */
const LYMAN_LIMIT = 911.75;

/** Optical depth of photoelectric absorption: the approximation of Madau 1995, footnote 3 (from memory). */
function photoelectricDepth(onePlusObserved: number, onePlusEmitted: number): number {
  const c = onePlusObserved;
  const e = onePlusEmitted;
  return (
    0.25 * c ** 3 * (e ** 0.46 - c ** 0.46) +
    9.4 * c ** 1.5 * (e ** 0.18 - c ** 0.18) -
    0.7 * c ** 3 * (c ** -1.32 - e ** -1.32) -
    0.023 * (e ** 1.68 - c ** 1.68)
  );
}

/**
 * Distance from a quasar, as a velocity (km/s), at which its own ionising light equals the background: 6 to 10
 * megaparsec at redshift 2 to 3 for quasars of survey magnitudes (Bajtlik, Duncan & Ostriker 1988, ApJ 327, 570;
 * size from memory). Without it the blue half of Lyα is absorbed too much and redshifts come out 300 to 700 km/s
 * too low.
 */
export const QUASAR_PROXIMITY_KM_S = 2000;

/**
 * Share of the mean neutral hydrogen left at a distance from a source that ionises it: 1/(1 + (r₀/r)²), an
 * inverse-square law on top of a uniform background (Bajtlik, Duncan & Ostriker 1988, eq 5).
 */
function neutralShare(velocityKmS: number, proximityKmS: number): number {
  const square = velocityKmS * velocityKmS;
  return square / (square + proximityKmS * proximityKmS);
}

/**
 * Mean transmission of the intergalactic hydrogen in front of a source (Madau 1995, ApJ 441, 18).
 * A mean: one sight line scatters around it by tens of per cent. Metal lines are left out.
 *
 * @param restAngstrom wavelength in the rest frame of the source, > 0
 * @param redshift of the source, ≥ 0; published for 0 to 5, an extrapolation beyond
 * @param proximityKmS reach of the source's own ionising light; default 0, as published
 * @returns 0 to 1; 1 redward of Lyman α
 */
export function intergalacticTransmission(
  restAngstrom: number,
  redshift: number,
  proximityKmS: number = 0,
): number {
  const observed = restAngstrom * (1 + redshift);
  let depth = 0;
  for (const { wavelength, strength } of FOREST) {
    // Absorbers lie between us and the source: nothing absorbs a line redward of its own rest wavelength.
    if (restAngstrom < wavelength && observed > wavelength) {
      const share =
        proximityKmS === 0
          ? 1
          : neutralShare(LIGHT_SPEED_KM_S * Math.log(wavelength / restAngstrom), proximityKmS);
      depth += share * strength * (observed / wavelength) ** FOREST_GROWTH;
    }
  }
  if (restAngstrom < LYMAN_LIMIT && observed > LYMAN_LIMIT) {
    depth += photoelectricDepth(observed / LYMAN_LIMIT, 1 + redshift);
  }
  return Math.exp(-Math.max(0, depth));
}
