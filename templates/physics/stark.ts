/**
 * Stark broadening of hydrogen lines, as a profile S(beta) of the shift in units of the Holtsmark field:
 * S = 3 / (C + beta^2.5). The far wing is twice Holtsmark's 1.5 beta^-2.5, because there the electrons act
 * quasi-statically as well as the ions; C makes the area 1. Within a factor 1.4 of the tables of Stehle &
 * Hutcheon 1999, A&AS 140, 93, for H beta to H delta; the unshifted component of H alpha is not in it.
 */
const WING_COEFFICIENT = 3;
/** (6 (pi / 2.5) / sin(pi / 2.5))^(5/3): the area over both sides is then 1. */
const CORE_CONSTANT = ((2 * WING_COEFFICIENT * (Math.PI / 2.5)) / Math.sin(Math.PI / 2.5)) ** (5 / 3);

/** S(beta) for beta >= 0; its integral over both sides is 1. */
export function starkShape(beta: number): number {
  return WING_COEFFICIENT / (CORE_CONSTANT + beta * beta * Math.sqrt(beta));
}

/** Shift beyond which the profile (strength times S(shift/scale)/scale) is below `floor`, in the units of scale. */
export function starkReach(strength: number, scale: number, floor: number): number {
  return scale * ((WING_COEFFICIENT * strength) / (scale * floor)) ** 0.4;
}

/** Holtsmark's normal field strength, statvolt per cm, of an electron density in cm^-3. */
export function normalField(electrons: number): number {
  return 1.25e-9 * electrons ** (2 / 3);
}

/**
 * Shift in angstrom per unit of beta and of normal field: K = 5.5e-5 (n m)^4 / (m^2 - n^2) / (1 + 0.13/(m-n))
 * for the line between levels n < m (Edmonds, Schlueter & Wells 1967, MemRAS 71, 271; from memory).
 */
export function starkScale(lower: number, upper: number): number {
  return (5.5e-5 * (lower * upper) ** 4) / (upper ** 2 - lower ** 2) / (1 + 0.13 / (upper - lower));
}

const AREA_POINTS = 400;
const LEAST_LN_BETA = Math.log(1e-3);
const GREATEST_LN_BETA = Math.log(1e4);

/**
 * Area of the profile when its argument is smoothed, S(sqrt(beta^2 + smoothing^2)): what is missing to 1
 * belongs into a Doppler core. Midpoint rule in ln beta.
 */
export function smoothedArea(smoothing: number): number {
  const step = (GREATEST_LN_BETA - LEAST_LN_BETA) / AREA_POINTS;
  let area = 0;
  for (let i = 0; i < AREA_POINTS; i += 1) {
    const beta = Math.exp(LEAST_LN_BETA + (i + 0.5) * step);
    area += 2 * starkShape(Math.sqrt(beta * beta + smoothing * smoothing)) * beta * step;
  }
  return Math.min(area, 1);
}
