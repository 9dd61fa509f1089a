/** Lines of atoms, all kinds of cool stars; more of them in the coolest; molecular bands. Height, kelvin, width. */
const HOT_STEP = { height: 0.35, temperature: 7500, width: 500 };
const COOL_STEP = { height: 0.6, temperature: 4800, width: 300 };
const MOLECULAR_BUMP = { height: 12, temperature: 2600, width: 700 };
/** Atomic lines saturate: their number grows less than the abundances. */
const ATOMIC_METAL_EXPONENT = 0.7;

const stepDown = (step: typeof HOT_STEP, temperature: number): number =>
  step.height / (1 + Math.exp((temperature - step.temperature) / step.width));

const molecularPart = (temperature: number, metallicity: number): number =>
  10 ** metallicity *
  MOLECULAR_BUMP.height *
  Math.exp(-(((temperature - MOLECULAR_BUMP.temperature) / MOLECULAR_BUMP.width) ** 2));

/**
 * Factor by which spectral lines raise the Rosseland mean above that of the continuum, at a temperature (K)
 * and metallicity (dex): atomic lines below 7500 K, more of them below 4800 K, and molecular bands around
 * 2600 K. Without the last term the bands of M dwarfs saturate and Na D is washed out.
 * Chosen to resemble published opacity tables; calibrated, not published.
 */
export function blanketingFactor(temperature: number, metallicity: number): number {
  const atoms = stepDown(HOT_STEP, temperature) + stepDown(COOL_STEP, temperature);
  return 1 + 10 ** (ATOMIC_METAL_EXPONENT * metallicity) * atoms + molecularPart(temperature, metallicity);
}

/** The haze reaches from the ultraviolet to here (angstrom), and ends softly. */
const HAZE_END = 5200;
const HAZE_END_WIDTH = 250;
/** Share of the blanketing of cool gas that the haze has. */
const HAZE_SHARE = 1.5;

/**
 * Opacity of the haze of faint lines in the blue of cool stars, relative to the continuum: the millions of
 * lines that a list of the strongest ones lacks. Without it the listed lines stand on a continuum that cool
 * stars do not have, and are twice too strong. Has the temperature dependence of the blanketing below 4800 K;
 * calibrated on the indices of M and K dwarfs in the library of Pickles 1998 (PASP 110, 863), not published.
 */
export function lineHaze(wavelengthAngstrom: number, temperature: number, metallicity: number): number {
  const cool =
    10 ** (ATOMIC_METAL_EXPONENT * metallicity) * stepDown(COOL_STEP, temperature) +
    molecularPart(temperature, metallicity);
  return (HAZE_SHARE * cool) / (1 + Math.exp((wavelengthAngstrom - HAZE_END) / HAZE_END_WIDTH));
}
