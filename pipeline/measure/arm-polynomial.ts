import type { RefitPixels } from './refit-pixels.ts';
import { solvePositiveDefinite } from '../core/solve-positive-definite.ts';

/** Span in ln(wavelength) of a spectrum from 3,600 to 9,300 Å: the range the polynomial orders were measured on. */
const FULL_SPAN = 0.95;
/** The polynomial mends flux calibration, which is never off by more than this factor over an arm. */
const SMALLEST = 0.2;
const LARGEST = 5;
/** Ridge on all but the constant term, relative to the mean diagonal: keeps gaps in the data harmless. */
const RIDGE = 1e-6;

/** Legendre polynomials of an arm's pixels; row p starts at p × (end − first). */
interface ArmBasis {
  readonly first: number;
  readonly end: number;
  readonly order: number;
  readonly rows: Float64Array;
}

/** A free smooth factor (or sum) in each arm: flux scale, calibration ripple, dust. */
export class ArmPolynomial {
  readonly #arms: readonly ArmBasis[];
  readonly #pixels: RefitPixels;

  /**
   * @param order for a spectrum over the full optical range; a shorter arm gets proportionally less, at
   *   least 1 (so that each arm keeps a free scale and slope)
   */
  constructor(pixels: RefitPixels, order: number) {
    this.#pixels = pixels;
    const filled = pixels.arms.filter(({ first, end }) => end > first);
    this.#arms = filled.map(({ first, end }) => {
      const span = pixels.lnHigh[end - 1]! - pixels.lnLow[first]!;
      const own = Math.min(order, Math.max(1, Math.round((order * span) / FULL_SPAN)));
      return { first, end, order: own, rows: legendreRows(pixels.place, first, end, own) };
    });
  }

  get freedom(): number {
    return this.#arms.reduce((sum, arm) => sum + arm.order + 1, 0);
  }

  /** Least-squares factor q(λ) with data ≈ q × model, clipped to a sane range; 1 where the model is empty. */
  factorFor(model: Float64Array, into: Float64Array): void {
    for (const arm of this.#arms) this.#fitArm(arm, model, into, SMALLEST, LARGEST);
  }

  /** Least-squares fit of the polynomial itself to the data; returns its chi-square. */
  fitAlone(into: Float64Array): number {
    const ones = new Float64Array(this.#pixels.count).fill(1);
    for (const arm of this.#arms) this.#fitArm(arm, ones, into, -Infinity, Infinity);
    let chiSquare = 0;
    const { flux, weight, count } = this.#pixels;
    for (let i = 0; i < count; i++) chiSquare += weight[i]! * (flux[i]! - into[i]!) ** 2;
    return chiSquare;
  }

  #fitArm(arm: ArmBasis, model: Float64Array, into: Float64Array, least: number, most: number): void {
    const { flux, weight } = this.#pixels;
    const { first, end, rows } = arm;
    const width = end - first;
    const terms = arm.order + 1;
    const matrix: number[][] = [];
    const right: number[] = [];
    for (let p = 0; p < terms; p++) {
      const row: number[] = [];
      for (let q = 0; q <= p; q++) {
        let sum = 0;
        for (let i = 0; i < width; i++) {
          const m = model[first + i]!;
          sum += rows[p * width + i]! * rows[q * width + i]! * m * m * weight[first + i]!;
        }
        row.push(sum);
      }
      let b = 0;
      for (let i = 0; i < width; i++) {
        b += rows[p * width + i]! * model[first + i]! * weight[first + i]! * flux[first + i]!;
      }
      matrix.push(row);
      right.push(b);
    }
    const trace = matrix.reduce((sum, row, p) => sum + row[p]!, 0) / terms;
    if (!(trace > 0)) {
      into.fill(1, first, end);
      return;
    }
    for (let p = 0; p < terms; p++) {
      for (let q = p + 1; q < terms; q++) matrix[p]!.push(matrix[q]![p]!);
      matrix[p]![p]! += p === 0 ? 1e-12 * trace : RIDGE * trace;
    }
    const coefficients = solvePositiveDefinite(matrix, right);
    for (let i = 0; i < width; i++) {
      let value = 0;
      for (let p = 0; p < terms; p++) value += coefficients[p]! * rows[p * width + i]!;
      into[first + i] = Math.min(Math.max(value, least), most);
    }
  }
}

/** Legendre polynomials by Bonnet's recurrence: (p+1) P_{p+1} = (2p+1) x P_p − p P_{p−1}. */
function legendreRows(place: Float64Array, first: number, end: number, order: number): Float64Array {
  const width = end - first;
  const rows = new Float64Array((order + 1) * width);
  for (let i = 0; i < width; i++) {
    const x = place[first + i]!;
    rows[i] = 1;
    if (order > 0) rows[width + i] = x;
    for (let p = 1; p < order; p++) {
      rows[(p + 1) * width + i] =
        ((2 * p + 1) * x * rows[p * width + i]! - p * rows[(p - 1) * width + i]!) / (p + 1);
    }
  }
  return rows;
}
