import { interpolateClamped } from './interpolate.ts';

/** Rounds of the implicit trapezoid step; six bring the pressure to 1e-6 for any opacity met here. */
const IMPLICIT_ROUNDS = 6;
/** Rounds for the starting pressure. */
const START_ROUNDS = 8;

/**
 * Gas pressure (dyn cm^-2) at every optical depth in hydrostatic equilibrium, dP/dtau = g / kappa
 * (e.g. Gray 2005, eq. 9.10), integrated inwards in ln tau by the implicit trapezoid rule.
 * @param tau ascending optical depths, first > 0.
 * @param gravity surface gravity, cm s^-2.
 * @param logPressures ascending log10 pressures at which the opacity is tabulated.
 * @param lnOpacity per depth the natural logarithm of the mass opacity (cm^2 g^-1) at those pressures.
 */
export function hydrostaticPressure(
  tau: Float64Array,
  gravity: number,
  logPressures: Float64Array,
  lnOpacity: readonly Float64Array[],
): Float64Array {
  const perLnTau = (depth: number, pressure: number): number =>
    (gravity * tau[depth]!) /
    Math.exp(interpolateClamped(logPressures, lnOpacity[depth]!, Math.log10(pressure)));
  const pressure = new Float64Array(tau.length);
  let start = 1;
  for (let round = 0; round < START_ROUNDS; round += 1) {
    start = perLnTau(0, start);
  }
  pressure[0] = start;
  for (let depth = 1; depth < tau.length; depth += 1) {
    const step = Math.log(tau[depth]! / tau[depth - 1]!);
    const above = pressure[depth - 1]!;
    const slopeAbove = perLnTau(depth - 1, above);
    let here = above + slopeAbove * step;
    for (let round = 0; round < IMPLICIT_ROUNDS; round += 1) {
      here = above + 0.5 * (slopeAbove + perLnTau(depth, here)) * step;
    }
    pressure[depth] = here;
  }
  return pressure;
}
