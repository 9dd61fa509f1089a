import { solvePositiveDefinite } from '../core/solve-positive-definite.ts';
import type { Columns } from './columns.ts';

/** A non-negative least-squares solution. */
export interface NonNegativeFit {
  /** Indices of the columns with a positive amplitude, in order of entry. */
  readonly active: readonly number[];
  /** Amplitudes of the active columns, same order. */
  readonly amplitudes: readonly number[];
  /** Sum of weight × (data − model)². */
  readonly chiSquare: number;
  /** Model at every pixel. */
  readonly model: Float64Array;
}

/** Added to the diagonal relative to it: near-copies among the templates would otherwise be singular. */
const RIDGE = 1e-7;
/** More active columns than this never paid in the refit; a bound keeps one bad spectrum from running on. */
const MOST_ACTIVE = 24;
const MOST_STEPS = 120;

/**
 * Non-negative least squares, active-set method of Lawson & Hanson 1974 (Solving Least Squares Problems,
 * ch. 23), with normal-matrix entries computed only between columns that become active: the families hold
 * up to 150 columns of which about ten are ever positive.
 *
 * Minimises sum_i w_i (d_i − sum_j x_j T_ij)² over x >= 0.
 *
 * @param entryGain chi-square a column must promise before it may enter, per column. 0 gives the plain
 *   solution; a positive value is the cost of one more free component.
 * @param start columns to begin with (a neighbouring redshift's active set); wrong guesses are dropped
 */
export function solveNonNegative(
  columns: Columns,
  data: Float64Array,
  weight: Float64Array,
  entryGain: Float64Array,
  start: readonly number[] = [],
): NonNegativeFit {
  const n = data.length;
  const weighted = new Float64Array(n);
  const model = new Float64Array(n);
  const norms = columnNorms(columns, weight, n);
  const largest = norms.reduce((m, v) => Math.max(m, v), 0);
  const state = new ActiveSet(columns, data, weight, norms, n);
  const barred = new Uint8Array(columns.count);
  for (const j of start) if (norms[j]! > 1e-10 * largest && state.size < MOST_ACTIVE) state.add(j);
  if (state.size > 0) state.settle();
  for (let step = 0; step < MOST_STEPS && state.size < MOST_ACTIVE; step++) {
    state.modelInto(model);
    for (let i = 0; i < n; i++) weighted[i] = weight[i]! * (data[i]! - model[i]!);
    const next = bestEntry(columns, weighted, norms, entryGain, state, barred, largest);
    if (next < 0) break;
    state.add(next);
    // A column that leaves at once was promised by rounding only: it may not come back (ends cycling).
    if (!state.settle().has(next)) barred[next] = 1;
  }
  state.modelInto(model);
  let chiSquare = 0;
  for (let i = 0; i < n; i++) chiSquare += weight[i]! * (data[i]! - model[i]!) ** 2;
  return { active: [...state.indices], amplitudes: [...state.amplitudes], chiSquare, model };
}

function columnNorms(columns: Columns, weight: Float64Array, n: number): Float64Array {
  const norms = new Float64Array(columns.count);
  for (let j = 0; j < columns.count; j++) {
    const base = j * n;
    let sum = 0;
    for (let i = columns.first[j]!; i < columns.end[j]!; i++) {
      const t = columns.values[base + i]!;
      sum += weight[i]! * t * t;
    }
    norms[j] = sum;
  }
  return norms;
}

/** Column with the largest promised gain (gradient² / norm) above its price, or −1. */
function bestEntry(
  columns: Columns,
  weighted: Float64Array,
  norms: Float64Array,
  entryGain: Float64Array,
  state: ActiveSet,
  barred: Uint8Array,
  largest: number,
): number {
  const n = weighted.length;
  let best = -1;
  let bestGain = 1e-3;
  for (let j = 0; j < columns.count; j++) {
    if (barred[j] || norms[j]! <= 1e-10 * largest || state.has(j)) continue;
    const base = j * n;
    let gradient = 0;
    for (let i = columns.first[j]!; i < columns.end[j]!; i++) {
      gradient += columns.values[base + i]! * weighted[i]!;
    }
    if (gradient <= 0) continue;
    const gain = (gradient * gradient) / norms[j]! - entryGain[j]!;
    if (gain > bestGain) {
      bestGain = gain;
      best = j;
    }
  }
  return best;
}

/** The passive set of Lawson & Hanson: its columns, their amplitudes, and the normal matrix among them. */
class ActiveSet {
  readonly indices: number[] = [];
  amplitudes: number[] = [];
  readonly #columns: Columns;
  readonly #data: Float64Array;
  readonly #weight: Float64Array;
  readonly #norms: Float64Array;
  readonly #n: number;
  readonly #gram: number[][] = [];
  readonly #right: number[] = [];

  constructor(columns: Columns, data: Float64Array, weight: Float64Array, norms: Float64Array, n: number) {
    this.#columns = columns;
    this.#data = data;
    this.#weight = weight;
    this.#norms = norms;
    this.#n = n;
  }

  get size(): number {
    return this.indices.length;
  }

  has(j: number): boolean {
    return this.indices.includes(j);
  }

  add(j: number): void {
    if (this.has(j)) return;
    const row = this.indices.map((k) => this.#product(j, k));
    row.forEach((value, position) => this.#gram[position]!.push(value));
    row.push(this.#norms[j]! * (1 + RIDGE));
    this.#gram.push(row);
    this.#right.push(this.#dataProduct(j));
    this.indices.push(j);
    this.amplitudes.push(0);
  }

  /** Solves on the set; steps back and drops columns until all amplitudes are positive. */
  settle(): this {
    for (;;) {
      const trial = solvePositiveDefinite(this.#gram, this.#right);
      if (trial.every((x) => x > 0)) {
        this.amplitudes = trial;
        return this;
      }
      let step = 1;
      trial.forEach((x, k) => {
        const now = this.amplitudes[k]!;
        if (x <= 0) step = Math.min(step, now / (now - x || 1));
      });
      this.amplitudes = this.amplitudes.map((now, k) => now + step * (trial[k]! - now));
      const worst = trial.reduce(
        (m, x, k) => (x <= 0 && this.amplitudes[k]! < this.amplitudes[m]! ? k : m),
        trial.findIndex((x) => x <= 0),
      );
      for (let k = this.size - 1; k >= 0; k--) {
        if (k === worst || (trial[k]! <= 0 && this.amplitudes[k]! <= 1e-14)) this.#remove(k);
      }
      if (this.size === 0) return this;
    }
  }

  modelInto(model: Float64Array): void {
    model.fill(0);
    this.indices.forEach((j, k) => {
      const base = j * this.#n;
      const x = this.amplitudes[k]!;
      for (let i = this.#columns.first[j]!; i < this.#columns.end[j]!; i++) {
        model[i]! += x * this.#columns.values[base + i]!;
      }
    });
  }

  #remove(position: number): void {
    this.indices.splice(position, 1);
    this.amplitudes.splice(position, 1);
    this.#right.splice(position, 1);
    this.#gram.splice(position, 1);
    for (const row of this.#gram) row.splice(position, 1);
  }

  #product(j: number, k: number): number {
    const { values, first, end } = this.#columns;
    const from = Math.max(first[j]!, first[k]!);
    const to = Math.min(end[j]!, end[k]!);
    const a = j * this.#n;
    const b = k * this.#n;
    let sum = 0;
    for (let i = from; i < to; i++) sum += this.#weight[i]! * values[a + i]! * values[b + i]!;
    return sum;
  }

  #dataProduct(j: number): number {
    const { values, first, end } = this.#columns;
    const base = j * this.#n;
    let sum = 0;
    for (let i = first[j]!; i < end[j]!; i++) sum += this.#weight[i]! * values[base + i]! * this.#data[i]!;
    return sum;
  }
}
