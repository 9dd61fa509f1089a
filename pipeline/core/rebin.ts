/**
 * Pixel edges half way between centres; the outer edges mirror the inner ones.
 *
 * @param centres increasing, length n >= 2
 * @returns n + 1 edges
 */
export function edgesFromCentres(centres: ArrayLike<number>): Float64Array {
  const n = centres.length;
  if (n < 2) throw new RangeError(`edgesFromCentres() needs at least 2 centres, got ${n}`);
  const edges = new Float64Array(n + 1);
  for (let i = 1; i < n; i++) edges[i] = 0.5 * (centres[i - 1]! + centres[i]!);
  edges[0] = centres[0]! - (edges[1]! - centres[0]!);
  edges[n] = centres[n - 1]! + (centres[n - 1]! - edges[n - 1]!);
  return edges;
}

/**
 * Integral of a piecewise constant density from the first edge to each edge.
 *
 * @param density length n, finite
 * @param edges length n + 1, increasing
 * @returns length n + 1, starting at 0
 */
export function cumulativeIntegral(density: ArrayLike<number>, edges: ArrayLike<number>): Float64Array {
  const sum = new Float64Array(density.length + 1);
  for (let i = 0; i < density.length; i++) sum[i + 1] = sum[i]! + density[i]! * (edges[i + 1]! - edges[i]!);
  return sum;
}

/**
 * Visits every pair of overlapping old and new pixels in order of increasing coordinate.
 *
 * @param from,to edges, increasing
 * @param visit old pixel, new pixel, length of the overlap (> 0)
 */
export function forEachOverlap(
  from: ArrayLike<number>,
  to: ArrayLike<number>,
  visit: (oldPixel: number, newPixel: number, overlap: number) => void,
): void {
  let i = 0;
  let j = 0;
  while (i < from.length - 1 && j < to.length - 1) {
    const overlap = Math.min(from[i + 1]!, to[j + 1]!) - Math.max(from[i]!, to[j]!);
    if (overlap > 0) visit(i, j, overlap);
    if (from[i + 1]! < to[j + 1]!) i++;
    else j++;
  }
}

/**
 * Mean density in new pixels such that the integral over any run of whole pixels is kept: each new pixel takes
 * from every old one in proportion to the overlap. New pixels beyond the old ones receive 0.
 *
 * @param density length n, finite
 * @param from n + 1 edges, increasing
 * @param to m + 1 edges, increasing
 * @returns length m
 */
export function rebinDensity(
  density: ArrayLike<number>,
  from: ArrayLike<number>,
  to: ArrayLike<number>,
): Float64Array {
  const out = new Float64Array(to.length - 1);
  forEachOverlap(from, to, (i, j, overlap) => {
    out[j] = out[j]! + density[i]! * overlap;
  });
  for (let j = 0; j < out.length; j++) out[j] = out[j]! / (to[j + 1]! - to[j]!);
  return out;
}
