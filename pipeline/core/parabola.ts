/** Vertex of the parabola through (−1, y0), (0, y1), (1, y2). */
export interface Vertex {
  /** Place of the extremum in steps from the middle point. */
  readonly offset: number;
  readonly value: number;
  /** Second derivative per step²: y0 − 2 y1 + y2; positive for a minimum. */
  readonly curvature: number;
}

/**
 * Vertex of the parabola through three equally spaced values.
 *
 * @returns null when the three lie on a line or are not finite: there is no vertex
 */
export function parabolaVertex(y0: number, y1: number, y2: number): Vertex | null {
  const curvature = y0 - 2 * y1 + y2;
  if (!Number.isFinite(curvature) || curvature === 0) return null;
  const offset = (0.5 * (y0 - y2)) / curvature;
  return { offset, value: y1 - 0.25 * (y0 - y2) * offset, curvature };
}
