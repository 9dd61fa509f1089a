import { blanketingFactor } from './blanketing.ts';
import type { Composition } from './composition.ts';
import { prepareContinuum } from './continuum.ts';
import type { ContinuumSource } from './continuum.ts';
import { solveGas } from './gas.ts';
import type { GasTables } from './gas.ts';
import { hydrostaticPressure } from './hydrostatic.ts';
import type { AtomicEdge } from './photo-ionisation.ts';
import { rosselandMean } from './rosseland.ts';
import { temperatureAt } from './temperature-structure.ts';

/** Tables of the atmosphere: the gas and its photo-ionisation levels. */
export interface AtmosphereTables extends GasTables {
  readonly atomicEdges: readonly AtomicEdge[];
}

/** What an atmosphere is asked for. */
export interface AtmosphereRequest {
  /** Effective temperature, kelvin. */
  readonly effectiveTemperature: number;
  /** log10 of the surface gravity in cm s^-2. */
  readonly logGravity: number;
  /** dex; enters the blanketing only, the composition holds the abundances. */
  readonly metallicity: number;
  readonly composition: Composition;
  /** Number of depths, at least 8. */
  readonly depths: number;
}

/** Plane-parallel atmosphere in hydrostatic equilibrium. */
export interface Atmosphere {
  /** Rosseland optical depths, ascending. */
  readonly tau: Float64Array;
  /** Rosseland mean opacity with blanketing, cm^-1, per depth. */
  readonly meanOpacity: Float64Array;
  /** Gas and continuous opacity at the depths. */
  readonly continuum: ContinuumSource;
}

const LOG_TAU_TOP = -5;
const LOG_TAU_BOTTOM = 2;
/** Pressures (log10 dyn cm^-2) of the opacity table that the integration interpolates. */
const LOG_PRESSURES = Float64Array.from({ length: 26 }, (_, i) => -3 + 0.5 * i);
/**
 * Convection carries flux below the photosphere of stars cooler than the first value and fades until the second
 * one: hotter envelopes are too thin. Degenerate stars (gravity above 10^6) are dense and convective to 9000 K.
 * Tuned on the Balmer indices of F0-A5 dwarfs in the library of Pickles 1998 (PASP 110, 863).
 */
const FULLY_CONVECTIVE_BELOW_K = 6600;
const RADIATIVE_ABOVE_K = 7600;
const DEGENERATE_ABOVE_LOG_GRAVITY = 6;
const DEGENERATE_RADIATIVE_ABOVE_K = 9000;
/** Optical depth below which convection limits the gradient. */
const CONVECTIVE_TAU = 0.7;
/**
 * Greatest d ln T / d ln P in thin gas: convection near the surface carries little there and lets the gradient
 * rise above the adiabatic one; deeper it approaches it. Choices in the range of mixing-length models.
 */
const SHALLOW_GRADIENT = 0.5;
const DEEP_GRADIENT = 0.28;
const DEEP_TAU = 4;
/**
 * In dense cool gas, as of M dwarfs, convection is efficient up to small optical depths and the dissociation of
 * hydrogen molecules lowers the adiabatic gradient (e.g. Allard & Hauschildt 1995, ApJ 445, 433). Choices.
 */
const DENSE_GRADIENT = 0.15;
const DENSE_TAU = 0.1;
const DENSE_LOG_PRESSURE = 5.5;
const DENSE_LOG_PRESSURE_WIDTH = 0.1;
/** Molecules dissociate in the convective layers of stars cooler than this, kelvin. */
const MOLECULAR_BELOW_K = 5900;

/** ln of the blanketed Rosseland mass opacity per depth on LOG_PRESSURES. */
function opacityTable(
  temperature: Float64Array,
  request: AtmosphereRequest,
  tables: AtmosphereTables,
): Float64Array[] {
  const columns = LOG_PRESSURES.length;
  const temperatures = new Float64Array(temperature.length * columns);
  const pressures = new Float64Array(temperatures.length);
  for (let cell = 0; cell < temperatures.length; cell += 1) {
    temperatures[cell] = temperature[Math.floor(cell / columns)]!;
    pressures[cell] = 10 ** LOG_PRESSURES[cell % columns]!;
  }
  const gas = solveGas(temperatures, pressures, request.composition, tables);
  const mean = rosselandMean(prepareContinuum(gas, request.composition, tables, tables.atomicEdges));
  const ln = mean.map((opacity, cell) =>
    Math.log((opacity * blanketingFactor(temperatures[cell]!, request.metallicity)) / gas.massDensity[cell]!),
  );
  return Array.from(temperature, (_, depth) => ln.subarray(depth * columns, (depth + 1) * columns));
}

/** How much convection limits the gradients of a star: 1 fully, 0 not at all. */
export function convectiveShare(effectiveTemperature: number, logGravity: number): number {
  if (logGravity > DEGENERATE_ABOVE_LOG_GRAVITY) {
    return effectiveTemperature < DEGENERATE_RADIATIVE_ABOVE_K ? 1 : 0;
  }
  const share = (RADIATIVE_ABOVE_K - effectiveTemperature) / (RADIATIVE_ABOVE_K - FULLY_CONVECTIVE_BELOW_K);
  return Math.min(Math.max(share, 0), 1);
}

/** Greatest gradient of full convection at an optical depth and pressure; no limit: Infinity. */
function greatestGradient(tau: number, pressure: number, isMolecular: boolean): number {
  const dense = isMolecular
    ? 1 / (1 + Math.exp((DENSE_LOG_PRESSURE - Math.log10(pressure)) / DENSE_LOG_PRESSURE_WIDTH))
    : 0;
  if (tau <= DENSE_TAU) {
    return Infinity;
  }
  if (tau <= CONVECTIVE_TAU) {
    return dense > 0.5 ? DENSE_GRADIENT / dense : Infinity;
  }
  const thin = tau > DEEP_TAU ? DEEP_GRADIENT : SHALLOW_GRADIENT;
  return dense * DENSE_GRADIENT + (1 - dense) * thin;
}

/** Lowers temperatures whose gradient convection would not allow; going inwards, in place. */
function limitGradient(
  tau: Float64Array,
  temperature: Float64Array,
  pressure: Float64Array,
  share: number,
  isMolecular: boolean,
): void {
  for (let depth = 1; depth < tau.length; depth += 1) {
    const gradient = greatestGradient(tau[depth]!, pressure[depth]!, isMolecular) / share;
    const limit = temperature[depth - 1]! * (pressure[depth]! / pressure[depth - 1]!) ** gradient;
    temperature[depth] = Math.min(temperature[depth]!, limit);
  }
}

/**
 * Builds the atmosphere of a star: a temperature law in optical depth, hydrostatic pressure, and for cool
 * stars one correction of the gradient for convection. Costs a tenth of a second.
 */
export function buildAtmosphere(request: AtmosphereRequest, tables: AtmosphereTables): Atmosphere {
  const { depths } = request;
  const gravity = 10 ** request.logGravity;
  const tau = Float64Array.from(
    { length: depths },
    (_, i) => 10 ** (LOG_TAU_TOP + ((LOG_TAU_BOTTOM - LOG_TAU_TOP) * i) / (depths - 1)),
  );
  const temperature = tau.map((depth) => temperatureAt(request.effectiveTemperature, depth));
  let pressure = hydrostaticPressure(tau, gravity, LOG_PRESSURES, opacityTable(temperature, request, tables));
  const share = convectiveShare(request.effectiveTemperature, request.logGravity);
  if (share > 0) {
    const isMolecular = request.effectiveTemperature < MOLECULAR_BELOW_K;
    limitGradient(tau, temperature, pressure, share, isMolecular);
    pressure = hydrostaticPressure(tau, gravity, LOG_PRESSURES, opacityTable(temperature, request, tables));
  }
  const gas = solveGas(temperature, pressure, request.composition, tables);
  const continuum = prepareContinuum(gas, request.composition, tables, tables.atomicEdges);
  const meanOpacity = rosselandMean(continuum).map(
    (opacity, depth) => opacity * blanketingFactor(temperature[depth]!, request.metallicity),
  );
  return { tau, meanOpacity, continuum };
}
