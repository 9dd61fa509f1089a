import type { LogGrid } from '../family.ts';
import { lineHaze } from './blanketing.ts';
import { continuumOpacity } from './continuum.ts';
import type { ContinuumSource } from './continuum.ts';

/** Opacity of an atmosphere on a fine wavelength grid: first the continuum, then lines are added to it. */
export interface OpacityRows {
  /** One row per depth on the grid, cm^-1. */
  readonly depths: readonly Float32Array[];
  /** The continuum alone at every CONTINUUM_STRIDE-th pixel, per depth: what lines are compared with. */
  readonly continuum: readonly Float32Array[];
}

const CONTINUUM_STRIDE = 64;
/** Relative spacing of the wavelengths at which the continuum is computed; logarithms are linear between. */
const COARSE_SPACING = 0.007;
/** Finer spacing where hydrogen levels dissolve: from each edge to this factor longward. */
const FINE_SPACING = 0.0015;
const DISSOLVING_TO = 1.27;
/** Distance of the nodes on both sides of an edge. */
const EDGE_GAP = 1e-6;
/** Keeps logarithms finite. */
const LEAST_OPACITY = 1e-37;

/** Wavelengths (angstrom, ascending) at which the continuum is computed for a grid. */
function continuumNodes(source: ContinuumSource, first: number, last: number): number[] {
  const nodes: number[] = [first, last];
  for (let w = first; w < last; w *= 1 + COARSE_SPACING) {
    nodes.push(w);
  }
  for (const edge of source.edges) {
    nodes.push(edge.edgeAngstrom * (1 - EDGE_GAP), edge.edgeAngstrom * (1 + EDGE_GAP));
  }
  for (const edge of source.lowHydrogen) {
    for (let w = edge.edgeAngstrom; w < edge.edgeAngstrom * DISSOLVING_TO; w *= 1 + FINE_SPACING) {
      nodes.push(w);
    }
  }
  const inside = nodes.filter((w) => w >= first && w <= last).sort((a, b) => a - b);
  return inside.filter((w, i) => i === 0 || w > inside[i - 1]!);
}

/** Fills a row by log-linear interpolation between nodes given in pixels. */
function fillRow(row: Float32Array, positions: Float64Array, lnOpacity: Float64Array): void {
  let node = 0;
  for (let i = 0; i < row.length; i += 1) {
    while (node < positions.length - 2 && positions[node + 1]! < i) {
      node += 1;
    }
    const left = positions[node]!;
    const part = (i - left) / (positions[node + 1]! - left);
    row[i] = Math.exp(lnOpacity[node]! + part * (lnOpacity[node + 1]! - lnOpacity[node]!));
  }
}

/**
 * The continuous opacity of an atmosphere on a wavelength grid, with the haze of faint lines of its metallicity
 * (dex), ready for lines to be added.
 */
export function continuumRows(source: ContinuumSource, metallicity: number, grid: LogGrid): OpacityRows {
  const first = Math.exp(grid.lnStart);
  const last = Math.exp(grid.lnStart + grid.step * (grid.length - 1));
  const nodes = continuumNodes(source, first, last);
  const positions = Float64Array.from(nodes, (w) => (Math.log(w) - grid.lnStart) / grid.step);
  const { length } = source.gas;
  const lnOpacity = Array.from({ length }, () => new Float64Array(nodes.length));
  const opacity = new Float64Array(length);
  for (const [node, wavelength] of nodes.entries()) {
    continuumOpacity(source, wavelength, opacity);
    for (let depth = 0; depth < length; depth += 1) {
      const haze = lineHaze(wavelength, source.gas.temperature[depth]!, metallicity);
      lnOpacity[depth]![node] = Math.log(Math.max(opacity[depth]! * (1 + haze), LEAST_OPACITY));
    }
  }
  const depths = lnOpacity.map((values) => {
    const row = new Float32Array(grid.length);
    fillRow(row, positions, values);
    return row;
  });
  const samples = Math.ceil(grid.length / CONTINUUM_STRIDE);
  const continuum = depths.map((row) =>
    Float32Array.from({ length: samples }, (_, i) => row[i * CONTINUUM_STRIDE]!),
  );
  return { depths, continuum };
}

/** The continuum (cm^-1) near a pixel of one depth; pixels outside the grid take its ends. */
export function localContinuum(rows: OpacityRows, depth: number, pixel: number): number {
  const samples = rows.continuum[depth]!;
  const i = Math.min(Math.max(Math.floor(pixel / CONTINUUM_STRIDE), 0), samples.length - 1);
  return samples[i]!;
}
