import { squaredDistanceToCone } from './cone.ts';
import { gramOf } from './gram-of.ts';
import { toUnitRms } from './unit-rows.ts';

/**
 * Which spectra of a set are needed so that every other one is a non-negative mixture of them within a
 * tolerance: what the refit cannot tell apart need not be offered to it. Greedy, the worst reproduced spectrum
 * next; distances only shrink as the choice grows, so an old distance is a bound and most are never renewed.
 *
 * @param rows spectra of equal length, any positive scale
 * @param tolerance rms of what is left of a spectrum, relative to its own rms, 0..1
 * @returns indices into `rows`, ascending, at least one
 */
export function neededForMixtures(rows: readonly Float32Array[], tolerance: number): number[] {
  const size = rows.length;
  if (size === 0) throw new RangeError('neededForMixtures must be given at least one spectrum, got none');
  const unit = rows.map(toUnitRms);
  const length = rows[0]!.length;
  const gram = gramOf(unit).map((sum) => sum / length);
  const chosen: number[] = [leastLike(gram, size)];
  const bound = new Float64Array(size).fill(Infinity);
  bound[chosen[0]!] = 0;
  for (;;) {
    const next = largestRenewed(gram, size, bound, chosen);
    if (bound[next]! <= tolerance * tolerance) return chosen.sort((a, b) => a - b);
    chosen.push(next);
    bound[next] = 0;
  }
}

/** The spectrum least like the mean of all: an end of the set. */
function leastLike(gram: Float64Array, size: number): number {
  let best = 0;
  let smallest = Infinity;
  for (let j = 0; j < size; j++) {
    let sum = 0;
    for (let k = 0; k < size; k++) sum += gram[j * size + k]!;
    if (sum < smallest) {
      smallest = sum;
      best = j;
    }
  }
  return best;
}

/** Renews the largest bound until the largest is a fresh one; returns its index. */
function largestRenewed(
  gram: Float64Array,
  size: number,
  bound: Float64Array,
  chosen: readonly number[],
): number {
  const fresh = new Set<number>(chosen);
  for (;;) {
    let largest = 0;
    for (let j = 1; j < size; j++) if (bound[j]! > bound[largest]!) largest = j;
    if (fresh.has(largest)) return largest;
    bound[largest] = squaredDistanceToCone(gram, size, largest, chosen);
    fresh.add(largest);
  }
}
