/** Kroupa 2001 (MNRAS 322, 231), eq 2: dN/dm ∝ m^−1.3 below half a solar mass, m^−2.3 above. */
const BREAK_MASS = 0.5;
const LOW_SLOPE = -1.3;
const HIGH_SLOPE = -2.3;

/** Number of stars born per unit mass, continuous, 1 at half a solar mass. @param mass ≥ 0.08 solar masses */
export function initialMassFunction(mass: number): number {
  return (mass / BREAK_MASS) ** (mass < BREAK_MASS ? LOW_SLOPE : HIGH_SLOPE);
}
