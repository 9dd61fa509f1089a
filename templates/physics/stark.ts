/**
 * Stark broadening of hydrogen lines by ions at rest (quasi-static): profile S(beta) in units of the field
 * ratio, after Edmonds, Schlueter & Wells 1967, MemRAS 71, 271 (form from memory): 8/(80 + beta^3) near the
 * centre, Holtsmark's 1.5 beta^-2.5 in the wing. The numerator is 7.65 here so that the area is 1 and both
 * pieces meet where they change over.
 */
const CORE_NUMERATOR = 7.65;
const CORE_CONSTANT = 80;
const WING_COEFFICIENT = 1.5;
const WING_BEYOND = 25.8;

/** S(beta) for beta >= 0; its integral over both sides is 1 within 1 per cent. */
export function starkShape(beta: number): number {
  return beta < WING_BEYOND
    ? CORE_NUMERATOR / (CORE_CONSTANT + beta * beta * beta)
    : WING_COEFFICIENT / (beta * beta * Math.sqrt(beta));
}

/** Holtsmark's normal field strength, statvolt per cm, of an electron density in cm^-3. */
export function normalField(electrons: number): number {
  return 1.25e-9 * electrons ** (2 / 3);
}

/**
 * Shift in angstrom per unit of beta and of normal field: K = 5.5e-5 (n m)^4 / (m^2 - n^2) / (1 + 0.13/(m-n))
 * for the line between levels n < m (Edmonds, Schlueter & Wells 1967).
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
