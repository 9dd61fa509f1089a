import { solveSymmetric } from '../../pipeline/core/cholesky.ts';

/** Added to the diagonal relative to it: spectra of neighbouring stars are nearly the same. */
const RIDGE = 1e-9;
/** Amplitudes of unit-rms spectra are of order one: anything below this is zero but for rounding. */
const SMALLEST_AMPLITUDE = 1e-12;

/**
 * Squared distance of one vector from the cone of non-negative mixtures of others, all known by their dot
 * products only (active-set method of Lawson & Hanson 1974, ch. 23).
 *
 * @param gram size × size dot products, row after row
 * @param target index of the vector
 * @param members indices of the vectors that may be mixed
 */
export function squaredDistanceToCone(
  gram: Float64Array,
  size: number,
  target: number,
  members: readonly number[],
): number {
  const dot = (j: number, k: number): number => gram[j * size + k]!;
  let active: number[] = [];
  let amplitudes: number[] = [];
  const solve = (indices: readonly number[]): number[] | null => {
    const n = indices.length;
    const matrix = new Float64Array(n * n);
    indices.forEach((j, a) => {
      indices.forEach((k, b) => {
        matrix[a * n + b] = dot(j, k) * (a === b ? 1 + RIDGE : 1);
      });
    });
    const solution = solveSymmetric(
      matrix,
      indices.map((j) => dot(j, target)),
      n,
    );
    return solution === null ? null : [...solution];
  };
  // Each step adds the member the rest points at most; two per member is ample, the bound ends cycling.
  for (let step = 0; step < 2 * members.length; step++) {
    const gain = (j: number): number =>
      (dot(j, target) - active.reduce((sum, k, b) => sum + amplitudes[b]! * dot(j, k), 0)) /
      Math.sqrt(dot(j, j));
    let best = -1;
    let bestGain = 1e-6 * Math.sqrt(dot(target, target));
    for (const j of members) {
      if (active.includes(j)) continue;
      const g = gain(j);
      if (g > bestGain) {
        best = j;
        bestGain = g;
      }
    }
    if (best < 0) break;
    const settled = settle([...active, best], [...amplitudes, 0], solve);
    if (settled === null || !settled.indices.includes(best)) break;
    active = settled.indices;
    amplitudes = settled.amplitudes;
  }
  let distance = dot(target, target);
  active.forEach((j, a) => {
    distance -= 2 * amplitudes[a]! * dot(j, target);
    active.forEach((k, b) => {
      distance += amplitudes[a]! * amplitudes[b]! * dot(j, k);
    });
  });
  return Math.max(0, distance);
}

/** Moves towards the free solution, dropping members as their amplitudes reach zero, until all are positive. */
function settle(
  indices: number[],
  amplitudes: number[],
  solve: (indices: readonly number[]) => number[] | null,
): { indices: number[]; amplitudes: number[] } | null {
  let members = indices;
  let from = amplitudes;
  for (;;) {
    const free = solve(members);
    if (free === null) return null;
    if (free.every((x) => x > 0)) return { indices: members, amplitudes: free };
    let part = 1;
    free.forEach((x, a) => {
      if (x <= 0) part = Math.min(part, from[a]! / (from[a]! - x));
    });
    const moved = free.map((x, a) => from[a]! + part * (x - from[a]!));
    members = members.filter((_, a) => moved[a]! > SMALLEST_AMPLITUDE);
    from = moved.filter((x) => x > SMALLEST_AMPLITUDE);
    if (members.length === 0) return { indices: [], amplitudes: [] };
  }
}
