import type { Kind } from '../../templates/family.ts';
import { parabolaVertex } from '../core/parabola.ts';

const SPEED_OF_LIGHT_KM_S = 299792.458;

/** One family's chi-square against redshift, in steps of ln(1+z). */
export interface RedshiftCurve {
  readonly kind: Kind;
  /** ln(1+z) of entry 0. */
  readonly lnStart: number;
  readonly step: number;
  /** NaN where not tried. */
  readonly chiSquare: Float64Array;
}

/** One minimum of a curve, refined by a parabola. */
export interface Minimum {
  readonly redshift: number;
  readonly chiSquare: number;
  /** 1-sigma of ln(1+z) from the curvature at Δχ² = 1; NaN at an edge. */
  readonly lnError: number;
  /** The minimum is the first or last redshift tried: the true one may lie beyond. */
  readonly atEdge: boolean;
  /** Entry of the curve nearest to it. */
  readonly index: number;
}

/**
 * The deepest minima of a curve that lie apart from each other, deepest first.
 *
 * @param count most minima returned, >= 0
 * @param separationKmS least distance between two of them
 */
export function deepestMinima(curve: RedshiftCurve, count: number, separationKmS: number): Minimum[] {
  const { chiSquare, step } = curve;
  const places: number[] = [];
  for (let i = 0; i < chiSquare.length; i++) {
    const here = chiSquare[i]!;
    // A comparison with NaN is false, so the neighbours of an untried redshift count as edges.
    if (Number.isFinite(here) && !(chiSquare[i - 1]! < here) && !(chiSquare[i + 1]! <= here)) places.push(i);
  }
  places.sort((a, b) => chiSquare[a]! - chiSquare[b]! || a - b);
  const apart = separationKmS / SPEED_OF_LIGHT_KM_S / step;
  const kept: number[] = [];
  for (const place of places) {
    if (kept.length >= count) break;
    if (kept.every((other) => Math.abs(other - place) >= apart)) kept.push(place);
  }
  return kept.map((index) => refine(curve, index));
}

function refine(curve: RedshiftCurve, index: number): Minimum {
  const { chiSquare, lnStart, step } = curve;
  const here = chiSquare[index]!;
  const vertex = parabolaVertex(chiSquare[index - 1] ?? NaN, here, chiSquare[index + 1] ?? NaN);
  if (vertex === null || vertex.curvature <= 0) {
    const atEdge = !Number.isFinite(chiSquare[index - 1]) || !Number.isFinite(chiSquare[index + 1]);
    return { redshift: Math.expm1(lnStart + index * step), chiSquare: here, lnError: NaN, atEdge, index };
  }
  return {
    redshift: Math.expm1(lnStart + (index + vertex.offset) * step),
    chiSquare: vertex.value,
    lnError: step * Math.sqrt(2 / vertex.curvature),
    atEdge: false,
    index,
  };
}
