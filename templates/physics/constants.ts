/** Physical constants in centimetre-gram-second units: CODATA 2018 (Tiesinga et al. 2021, Rev. Mod. Phys. 93, 025010). */

export const BOLTZMANN = 1.380649e-16;
export const PLANCK = 6.62607015e-27;
export const LIGHT_SPEED = 2.99792458e10;
export const LIGHT_SPEED_KM_S = 2.99792458e5;
export const ELECTRON_VOLT = 1.602176634e-12;
export const ELECTRON_MASS = 9.1093837e-28;
export const ATOMIC_MASS_UNIT = 1.66053907e-24;
export const STEFAN_BOLTZMANN = 5.670374e-5;
export const THOMSON_CROSS_SECTION = 6.6524587e-25;
export const FINE_STRUCTURE = 7.2973525693e-3;
/** Bohr radius squared, cm^2. */
export const BOHR_AREA = 2.80028521e-17;
/** pi e^2 / (m c), cm^2 s^-1: the integrated absorption cross-section of a line with f = 1. */
export const LINE_CROSS_SECTION = 0.0265400885;
/** h c / k, cm K. */
export const SECOND_RADIATION = 1.438776877;
/** 1 eV / k, kelvin. */
export const KELVIN_PER_EV = ELECTRON_VOLT / BOLTZMANN;
/** 1 eV / (h c), cm^-1. */
export const WAVENUMBER_PER_EV = 8065.543937;
/** Rydberg constant of hydrogen with its reduced mass, cm^-1. */
export const RYDBERG_HYDROGEN = 109677.5834;
/** Ionisation energy of hydrogen from the ground state, eV. */
export const HYDROGEN_IONISATION_EV = 13.598434;
export const SQRT_PI = 1.7724538509055159;
