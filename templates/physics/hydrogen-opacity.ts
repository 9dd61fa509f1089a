import type { LogGrid } from '../family.ts';
import {
  ATOMIC_MASS_UNIT,
  BOHR_AREA,
  BOLTZMANN,
  HYDROGEN_IONISATION_EV,
  KELVIN_PER_EV,
  LIGHT_SPEED,
  LIGHT_SPEED_KM_S,
  LINE_CROSS_SECTION,
  SECOND_RADIATION,
  SQRT_PI,
} from './constants.ts';
import type { Gas } from './gas.ts';
import { HYDROGEN_LINES } from './hydrogen-lines.ts';
import type { HydrogenLine } from './hydrogen-lines.ts';
import { localContinuum } from './opacity-rows.ts';
import type { OpacityRows } from './opacity-rows.ts';
import { boundShare } from './occupation.ts';
import { normalField, smoothedArea, starkReach, starkScale, starkShape } from './stark.ts';

const HYDROGEN_WEIGHT = 1.008;
/** Farthest reach of a line, km/s, by lower level; lines of higher members are narrower. Limits the work. */
const REACH_KM_S = [60000, 40000, 20000];
const HIGHER_MEMBER = 3;
const HIGHER_REACH = 1 / 1.6;
/** The wing is cut where it falls below this share of the continuum. */
const CUT_OFF = 5e-4;
/** The Doppler core is nil beyond u^2 of this. */
const CORE_REACH = 30;
/** No line of hydrogen is broadened more than this by its own kind, s^-1: a guard in dense cool gas. */
const GREATEST_SELF_WIDTH = 1e13;
/** (4/pi)^(alpha/2) Gamma(2 - alpha/2) for alpha = 0.4-0.7: 0.977-0.979 (Anstee & O'Mara 1995). */
const VELOCITY_AVERAGE = 0.978;
/** Velocity at which the cross-sections are given, cm/s. */
const REFERENCE_VELOCITY = 1e6;

/**
 * Broadening by neutral hydrogen: cross-section (Bohr areas) and its velocity exponent. H alpha, beta, gamma:
 * Barklem, Piskunov & O'Mara 2000, A&A 363, 1091 (from memory); others scaled by the cube of the level.
 */
function selfBroadening(line: HydrogenLine): readonly [number, number] {
  if (line.lower === 2 && line.upper === 3) {
    return [1180, 0.677];
  }
  if (line.lower === 2 && line.upper === 4) {
    return [2320, 0.455];
  }
  if (line.lower === 2 && line.upper < 9) {
    return [4208 * (line.upper / 5) ** 3, 0.38];
  }
  return [1180 * (line.upper / 3) ** 3, 0.5];
}

/** Adds one line at one depth. */
function addLineAt(
  line: HydrogenLine,
  gas: Gas,
  depth: number,
  microturbulence: number,
  grid: LogGrid,
  rows: OpacityRows,
): void {
  const t = gas.temperature[depth]!;
  const electrons = gas.electrons[depth]!;
  const neutral = gas.neutralHydrogen[depth]!;
  const lambda = line.wavelength;
  const centimetre = lambda * 1e-8;
  const excitation = HYDROGEN_IONISATION_EV * (1 - 1 / line.lower ** 2);
  const lowerAtoms = neutral * line.lower ** 2 * Math.exp((-excitation * KELVIN_PER_EV) / t);
  /** Opacity integrated over angstroms: cross-section, stimulated emission, and d(nu) to d(lambda). */
  const strength =
    (LINE_CROSS_SECTION *
      line.oscillatorStrength *
      lowerAtoms *
      boundShare(line.upper, electrons) *
      (1 - Math.exp(-SECOND_RADIATION / (centimetre * t))) *
      centimetre ** 2 *
      1e8) /
    LIGHT_SPEED;
  const thermal = Math.sqrt(
    (2 * BOLTZMANN * t) / (HYDROGEN_WEIGHT * ATOMIC_MASS_UNIT) + microturbulence ** 2,
  );
  const doppler = (thermal / LIGHT_SPEED) * lambda;
  const scale = starkScale(line.lower, line.upper) * normalField(electrons);
  const [area, exponent] = selfBroadening(line);
  const relative = Math.sqrt((16 * BOLTZMANN * t) / (Math.PI * HYDROGEN_WEIGHT * ATOMIC_MASS_UNIT));
  const selfWidth = Math.min(
    2 *
      VELOCITY_AVERAGE *
      neutral *
      relative *
      area *
      BOHR_AREA *
      (relative / REFERENCE_VELOCITY) ** -exponent,
    GREATEST_SELF_WIDTH,
  );
  /** Half width of the Lorentz profile, angstrom. */
  const lorentz = (selfWidth * lambda * centimetre) / (4 * Math.PI * LIGHT_SPEED);
  const core = (1 - smoothedArea(doppler / scale)) / (SQRT_PI * doppler);

  const centre = (Math.log(lambda) - grid.lnStart) / grid.step;
  const floor = CUT_OFF * localContinuum(rows, depth, Math.round(centre));
  const lorentzReach = Math.sqrt((strength * lorentz) / (Math.PI * floor));
  const coreReach = Math.sqrt(CORE_REACH) * doppler;
  const limit = REACH_KM_S[line.lower - 1]! * (line.upper - line.lower < HIGHER_MEMBER ? 1 : HIGHER_REACH);
  const reach = Math.min(
    Math.max(starkReach(strength, scale, floor), lorentzReach, coreReach) / lambda,
    limit / LIGHT_SPEED_KM_S,
  );
  const first = Math.max(Math.ceil(centre - reach / grid.step), 0);
  const last = Math.min(Math.floor(centre + reach / grid.step), grid.length - 1);
  const row = rows.depths[depth]!;
  const smoothing = doppler * doppler;
  const cauchy = lorentz / Math.PI;
  const cauchySmoothing = lorentz * lorentz + smoothing;
  for (let i = first; i <= last; i += 1) {
    const shift = lambda * (i - centre) * grid.step;
    const square = shift * shift;
    let profile = starkShape(Math.sqrt(square + smoothing) / scale) / scale;
    if (square < CORE_REACH * smoothing) {
      profile += core * Math.exp(-square / smoothing);
    }
    profile += cauchy / (square + cauchySmoothing);
    row[i]! += strength * profile;
  }
}

/**
 * Adds the lines of hydrogen to the opacity: quasi-static Stark profile smoothed over the Doppler width with
 * the missing area in a Doppler core, plus the Lorentz wing of collisions among hydrogen atoms.
 * @param microturbulence cm/s.
 */
export function addHydrogenLines(gas: Gas, microturbulence: number, grid: LogGrid, rows: OpacityRows): void {
  for (const line of HYDROGEN_LINES) {
    for (let depth = 0; depth < gas.length; depth += 1) {
      addLineAt(line, gas, depth, microturbulence, grid, rows);
    }
  }
}
