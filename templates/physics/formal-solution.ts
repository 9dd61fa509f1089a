import type { LogGrid } from '../family.ts';
import { LIGHT_SPEED, PLANCK, SECOND_RADIATION } from './constants.ts';

/** Three-point Gauss quadrature of the outward directions: cosines and weights on 0..1. */
const COSINES = [0.1127016654, 0.5, 0.8872983346];
const WEIGHTS = [0.2777777778, 0.4444444444, 0.2777777778];
/** Pixels handled together, so that the loops run along memory. */
const BLOCK = 512;
/** Deeper layers are not seen when less than this comes through. */
const OPAQUE = 1e-9;
/** Below this optical step the difference formulae lose digits; their limit is used. */
const THIN_STEP = 1e-4;
/** 2 pi h c^2 in erg s^-1 cm^2, times 1e-8 for per-angstrom flux. */
const FLUX_COEFFICIENT = 2 * Math.PI * PLANCK * LIGHT_SPEED ** 2 * 1e-8;

/** What leaves a layered atmosphere needs. */
export interface LayeredAtmosphere {
  /** Reference optical depths, ascending. */
  readonly tau: Float64Array;
  /** Opacity that the reference depths belong to, cm^-1. */
  readonly meanOpacity: Float64Array;
  /** Kelvin. */
  readonly temperature: Float64Array;
}

/** Adds the light of one step between two layers in one direction; returns nothing, works on a pixel's state. */
interface BlockState {
  readonly opacityTau: Float64Array;
  readonly source: Float64Array;
  readonly flux: Float64Array;
  readonly passing: readonly Float64Array[];
}

function startBlock(state: BlockState, pixel: number, opacityTau: number, source: number): void {
  let flux = 0;
  for (let m = 0; m < COSINES.length; m += 1) {
    const passing = Math.exp(-opacityTau / COSINES[m]!);
    flux += 2 * WEIGHTS[m]! * COSINES[m]! * source * (1 - passing);
    state.passing[m]![pixel] = passing;
  }
  state.opacityTau[pixel] = opacityTau;
  state.source[pixel] = source;
  state.flux[pixel] = flux;
}

/** Source linear in optical depth between the layers: integral of S exp(-t) over the step, in closed form. */
function stepInward(
  state: BlockState,
  pixel: number,
  opacityTau: number,
  source: number,
  step: number,
): void {
  const above = state.source[pixel]!;
  const thickness = 0.5 * (opacityTau + state.opacityTau[pixel]!) * step;
  let flux = state.flux[pixel]!;
  for (let m = 0; m < 3; m += 1) {
    const cosine = COSINES[m]!;
    const row = state.passing[m]!;
    const passing = row[pixel]!;
    if (passing < OPAQUE) {
      continue;
    }
    const t = thickness / cosine;
    let seen: number;
    if (t < THIN_STEP) {
      seen = 0.5 * (source + above) * t;
      row[pixel] = passing * (1 - t + 0.5 * t * t);
    } else {
      const e = Math.exp(-t);
      seen = above * (1 - e) + ((source - above) / t) * (1 - e - t * e);
      row[pixel] = passing * e;
    }
    flux += 2 * WEIGHTS[m]! * cosine * passing * seen;
  }
  state.opacityTau[pixel] = opacityTau;
  state.source[pixel] = source;
  state.flux[pixel] = flux;
}

/**
 * Flux density leaving the surface, erg s^-1 cm^-2 angstrom^-1, on a vacuum wavelength grid: F = 2 pi int I mu
 * d mu with a Planck source function (local thermodynamic equilibrium), optical depths by the trapezoid rule
 * in ln tau.
 * @param rows opacity in cm^-1, one row per depth.
 */
export function emergentFlux(
  atmosphere: LayeredAtmosphere,
  grid: LogGrid,
  rows: readonly Float32Array[],
): Float64Array {
  const depths = atmosphere.tau.length;
  const result = new Float64Array(grid.length);
  const perOpacity = atmosphere.tau.map((tau, depth) => tau / atmosphere.meanOpacity[depth]!);
  const state: BlockState = {
    opacityTau: new Float64Array(BLOCK),
    source: new Float64Array(BLOCK),
    flux: new Float64Array(BLOCK),
    passing: COSINES.map(() => new Float64Array(BLOCK)),
  };
  /** hc/k over wavelength, so that the exponent of Planck's law is this over temperature. */
  const radiation = new Float64Array(BLOCK);
  const slant = state.passing[COSINES.length - 1]!;
  for (let start = 0; start < grid.length; start += BLOCK) {
    const size = Math.min(BLOCK, grid.length - start);
    for (let pixel = 0; pixel < size; pixel += 1) {
      const centimetre = Math.exp(grid.lnStart + grid.step * (start + pixel)) * 1e-8;
      radiation[pixel] = SECOND_RADIATION / centimetre;
    }
    for (let depth = 0; depth < depths; depth += 1) {
      const row = rows[depth]!;
      const scale = perOpacity[depth]!;
      const inverse = 1 / atmosphere.temperature[depth]!;
      const step = depth > 0 ? Math.log(atmosphere.tau[depth]! / atmosphere.tau[depth - 1]!) : 0;
      for (let pixel = 0; pixel < size; pixel += 1) {
        if (depth > 0 && slant[pixel]! < OPAQUE) {
          continue;
        }
        const source = 1 / (Math.exp(radiation[pixel]! * inverse) - 1);
        const opacityTau = row[start + pixel]! * scale;
        if (depth === 0) {
          startBlock(state, pixel, opacityTau, source);
        } else {
          stepInward(state, pixel, opacityTau, source, step);
        }
      }
    }
    for (let pixel = 0; pixel < size; pixel += 1) {
      let flux = state.flux[pixel]!;
      for (let m = 0; m < COSINES.length; m += 1) {
        flux += 2 * WEIGHTS[m]! * COSINES[m]! * state.passing[m]![pixel]! * state.source[pixel]!;
      }
      const centimetre = SECOND_RADIATION / radiation[pixel]!;
      result[start + pixel] = (flux * FLUX_COEFFICIENT) / centimetre ** 5;
    }
  }
  return result;
}
