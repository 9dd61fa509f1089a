import type { Component, LogGrid } from '../../templates/family.ts';
import type { RefitPixels } from './refit-pixels.ts';

/** Components seen through the spectrograph's pixels at one redshift: column j is zero outside first..end-1. */
export interface Columns {
  readonly count: number;
  /** Column j starts at j × pixels.count. */
  readonly values: Float64Array;
  readonly first: Int32Array;
  readonly end: Int32Array;
}

const integrals = new WeakMap<Float32Array, Float64Array>();

/** Running integral of a component over its grid, kept with the component: shifting it is then two look-ups. */
function runningIntegral(flux: Float32Array): Float64Array {
  const known = integrals.get(flux);
  if (known) return known;
  const sum = new Float64Array(flux.length + 1);
  for (let i = 0; i < flux.length; i++) sum[i + 1] = sum[i]! + flux[i]!;
  integrals.set(flux, sum);
  return sum;
}

/**
 * Mean of each component over each native pixel: the exact integral of the (piecewise constant) component
 * between the pixel's edges, shifted to `redshift`. Pixels that fall outside the component's grid see zero.
 *
 * @param scratch reused between calls when large enough; pass the previous result to avoid allocation
 */
export function renderColumns(
  components: readonly Component[],
  grid: LogGrid,
  redshift: number,
  pixels: RefitPixels,
  scratch?: Columns,
): Columns {
  const n = pixels.count;
  const columns = roomFor(components.length, n, scratch);
  const { low, high } = edgePositions(grid, redshift, pixels);
  components.forEach((component, j) => {
    const from = firstAtLeast(high, component.first);
    const to = firstAtLeast(low, component.end);
    // Arms may overlap, so positions are increasing only inside an arm: see edgePositions.
    const base = j * n;
    let first = n;
    let end = 0;
    columns.values.fill(0, base, base + n);
    const integral = runningIntegral(component.flux);
    const last = component.flux.length;
    for (let a = 0; a < pixels.arms.length; a++) {
      for (let i = from[a]!; i < to[a]!; i++) {
        const x0 = Math.min(Math.max(low.positions[i]!, 0), last);
        const x1 = Math.min(Math.max(high.positions[i]!, 0), last);
        const k0 = Math.floor(x0);
        const k1 = Math.floor(x1);
        const s0 = integral[k0]! + (x0 - k0) * (component.flux[k0] ?? 0);
        const s1 = integral[k1]! + (x1 - k1) * (component.flux[k1] ?? 0);
        columns.values[base + i] = (s1 - s0) / (high.positions[i]! - low.positions[i]!);
      }
      if (to[a]! > from[a]!) {
        first = Math.min(first, from[a]!);
        end = Math.max(end, to[a]!);
      }
    }
    columns.first[j] = Math.min(first, end);
    columns.end[j] = end;
  });
  return columns;
}

interface Edges {
  readonly positions: Float64Array;
  readonly arms: RefitPixels['arms'];
}

/** Pixel edges in units of grid pixels; edge of grid pixel 0 is at position 0. Increasing inside each arm. */
function edgePositions(grid: LogGrid, redshift: number, pixels: RefitPixels): { low: Edges; high: Edges } {
  const shift = Math.log1p(redshift) + grid.lnStart;
  const low = new Float64Array(pixels.count);
  const high = new Float64Array(pixels.count);
  for (let i = 0; i < pixels.count; i++) {
    low[i] = (pixels.lnLow[i]! - shift) / grid.step + 0.5;
    high[i] = (pixels.lnHigh[i]! - shift) / grid.step + 0.5;
  }
  return { low: { positions: low, arms: pixels.arms }, high: { positions: high, arms: pixels.arms } };
}

/** Per arm, the first pixel whose edge is at or beyond `position`. */
function firstAtLeast(edges: Edges, position: number): Int32Array {
  const result = new Int32Array(edges.arms.length);
  edges.arms.forEach((arm, a) => {
    let lo = arm.first;
    let hi = arm.end;
    while (lo < hi) {
      const mid = (lo + hi) >> 1;
      if (edges.positions[mid]! < position) lo = mid + 1;
      else hi = mid;
    }
    result[a] = lo;
  });
  return result;
}

function roomFor(count: number, pixels: number, scratch: Columns | undefined): Columns {
  if (scratch && scratch.values.length >= count * pixels && scratch.first.length >= count) {
    return { count, values: scratch.values, first: scratch.first, end: scratch.end };
  }
  return {
    count,
    values: new Float64Array(count * pixels),
    first: new Int32Array(count),
    end: new Int32Array(count),
  };
}
