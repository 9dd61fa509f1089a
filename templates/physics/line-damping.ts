import { HYDROGEN_IONISATION_EV, WAVENUMBER_PER_EV } from './constants.ts';

/** Widths of an atomic line as angular frequencies (full width at half maximum of the Lorentz profile). */
export interface Damping {
  /** s^-1. */
  readonly radiative: number;
  /** s^-1 per neutral hydrogen atom and cm^3, at 10,000 K; grows as T^0.3. */
  readonly vanDerWaals: number;
  /** s^-1 per electron and cm^3. */
  readonly stark: number;
}

/** Classical damping constant is this over wavelength^2 (angstrom): 0.2223e16 (e.g. Gray 2005, eq. 11.13). */
const CLASSICAL_DAMPING = 2.2e15;
/** C6 = 6.46e-34 (r_u^2 - r_l^2) with radii in Bohr units (Unsoeld 1955). */
const C6_PER_RADIUS_SQUARED = 6.46e-34;
/** gamma = 17 C6^0.4 v^0.6 N, relative velocity of hydrogen at 10,000 K in cm/s. */
const UNSOELD = 17;
const RELATIVE_VELOCITY = 1.46e6;
/** Unsoeld's widths are too small; factor found from solar line wings (common practice 1.5-2.5). */
const ENHANCEMENT = 1.8;
/** Least distances (eV) of the levels from the ionisation limit: autoionising levels would give infinite radii. */
const LEAST_LOWER_BINDING_EV = 0.3;
const LEAST_UPPER_BINDING_EV = 0.25;
/** Width by electrons for an effective quantum number of 6, and its greatest value. Order of magnitude, from memory. */
const STARK_AT_SIX = 2e-6;
const GREATEST_STARK = 3e-4;

/** Lines whose van der Waals width is known better: log10 at 10,000 K (Barklem et al. 2000 and Anstee & O'Mara 1995, from memory). */
const KNOWN_WIDTHS: readonly {
  readonly number: number;
  readonly ion: number;
  readonly from: number;
  readonly to: number;
  readonly logWidth: number;
}[] = [
  { number: 11, ion: 0, from: 5890, to: 5900, logWidth: -7.53 },
  { number: 11, ion: 0, from: 5889, to: 5890, logWidth: -7.53 },
  { number: 20, ion: 1, from: 3930, to: 3970, logWidth: -7.76 },
  { number: 20, ion: 1, from: 8490, to: 8670, logWidth: -7.68 },
  { number: 12, ion: 0, from: 5160, to: 5190, logWidth: -7.27 },
  { number: 20, ion: 0, from: 4220, to: 4230, logWidth: -7.56 },
  { number: 19, ion: 0, from: 7660, to: 7700, logWidth: -7.45 },
];
/** Weaker lines of the same species in those ranges are other lines. */
const KNOWN_ABOVE_LOG_GF = -1.5;

/** Mean square radius of a level of effective quantum number squared `n2`, in Bohr radii (l = 0 form). */
const squareRadius = (n2: number, charge: number): number => (n2 * (5 * n2 + 1)) / (2 * charge * charge);

/**
 * Damping of an atomic line by radiation (classical), neutral hydrogen (Unsoeld 1955, enhanced, or known
 * values) and electrons (order of magnitude).
 * @param line air wavelength (angstrom), atomic number, ion (0 = neutral), lower energy (eV), log gf.
 * @param ionisationEv ionisation energy of that ion.
 */
export function atomicDamping(
  line: {
    readonly wavelength: number;
    readonly number: number;
    readonly ion: number;
    readonly energyEv: number;
    readonly logGf: number;
  },
  ionisationEv: number,
): Damping {
  const charge = line.ion + 1;
  const upperEv = line.energyEv + 1e8 / line.wavelength / WAVENUMBER_PER_EV;
  const hydrogenic = HYDROGEN_IONISATION_EV * charge * charge;
  const lowerN2 = hydrogenic / Math.max(ionisationEv - line.energyEv, LEAST_LOWER_BINDING_EV);
  const upperN2 = hydrogenic / Math.max(ionisationEv - upperEv, LEAST_UPPER_BINDING_EV);
  const radii = Math.max(squareRadius(upperN2, charge) - squareRadius(lowerN2, charge), 1);
  const known = KNOWN_WIDTHS.find(
    (width) =>
      width.number === line.number &&
      width.ion === line.ion &&
      line.wavelength >= width.from &&
      line.wavelength < width.to &&
      line.logGf > KNOWN_ABOVE_LOG_GF,
  );
  return {
    radiative: CLASSICAL_DAMPING / line.wavelength ** 2,
    vanDerWaals: known
      ? 10 ** known.logWidth
      : UNSOELD * (C6_PER_RADIUS_SQUARED * radii) ** 0.4 * RELATIVE_VELOCITY ** 0.6 * ENHANCEMENT,
    stark: Math.min(STARK_AT_SIX * (upperN2 / 6) ** 2.5, GREATEST_STARK),
  };
}
