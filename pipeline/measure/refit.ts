import type { Component, ComponentRole, Family } from '../../templates/family.ts';
import { ArmPolynomial } from './arm-polynomial.ts';
import { type Columns, renderColumns } from './columns.ts';
import { type NonNegativeFit, solveNonNegative } from './nnls.ts';
import type { RefitPixels } from './refit-pixels.ts';

/** A physical model of the spectrum at one redshift. Fluxes are in units of `RefitPixels.fluxScale`. */
export interface Refit {
  readonly redshift: number;
  /** Σ weight (data − model)² over the used native pixels. */
  readonly chiSquare: number;
  /** What freedom cost: the sum of the prices of the active components. */
  readonly price: number;
  readonly active: readonly { readonly component: Component; readonly amplitude: number }[];
  /** Indices of the active components: where a neighbouring redshift may start. */
  readonly activeIndices: readonly number[];
  /** Full model and its part without narrow and broad lines, at each used pixel. */
  readonly model: Float64Array;
  readonly continuum: Float64Array;
}

/**
 * Chi-square a component must gain to be worth its freedom, by role. One more amplitude on pure noise gains
 * 1/2 on average under the sign constraint, the best of a dozen line groups about 3 (a chi-square look-elsewhere
 * of 2 ln 12 less the sign constraint); measured on noise in templates.md's terms as +3 per emission component.
 */
const PRICE: Readonly<Record<ComponentRole, number>> = {
  continuum: 0,
  host: 1,
  iron: 1,
  'balmer-continuum': 1,
  'narrow-line': 3,
  'broad-line': 3,
};

/** Alternations between amplitudes and polynomial; a third moved chi-square by less than 0.1. */
const ROUNDS = 2;
/** Alternations that are enough to rank hypotheses by; the leaders are refitted in full. */
export const ROUNDS_TO_RANK = 1;

/**
 * Refits one spectrum with physical components, amplitudes non-negative (Lawson & Hanson 1974), times a
 * low-order polynomial in each arm. Holds the scratch space, so one is made per spectrum and thrown away.
 */
export class Refitter {
  readonly #pixels: RefitPixels;
  readonly #polynomials = new Map<number, ArmPolynomial>();
  #columns: Columns | undefined;
  readonly #factor: Float64Array;
  readonly #divided: Float64Array;
  readonly #weight: Float64Array;

  constructor(pixels: RefitPixels) {
    this.#pixels = pixels;
    this.#factor = new Float64Array(pixels.count);
    this.#divided = new Float64Array(pixels.count);
    this.#weight = new Float64Array(pixels.count);
  }

  polynomial(order: number): ArmPolynomial {
    let known = this.#polynomials.get(order);
    if (!known) {
      known = new ArmPolynomial(this.#pixels, order);
      this.#polynomials.set(order, known);
    }
    return known;
  }

  /**
   * @param start active components of a nearby redshift of the same refit set
   * @param rounds alternations between amplitudes and polynomial
   */
  at(family: Family, redshift: number, start: readonly number[] = [], rounds = ROUNDS): Refit {
    const pixels = this.#pixels;
    const components = family.componentsAt(redshift);
    const columns = renderColumns(components, family.componentGrid, redshift, pixels, this.#columns);
    this.#columns = columns;
    const prices = Float64Array.from(components, (component) => PRICE[component.role]);
    const polynomial = this.polynomial(family.multiplicativeOrder);
    const factor = this.#factor.fill(1);
    let fit = solveNonNegative(columns, pixels.flux, pixels.weight, prices, start);
    let best = assemble(components, columns, fit, factor, pixels, redshift);
    for (let round = 0; round < rounds && fit.active.length > 0; round++) {
      polynomial.factorFor(fit.model, factor);
      // data ≈ q·T·x with weight w is the same problem as data/q ≈ T·x with weight w·q².
      for (let i = 0; i < pixels.count; i++) {
        const q = factor[i]!;
        this.#divided[i] = pixels.flux[i]! / q;
        this.#weight[i] = pixels.weight[i]! * q * q;
      }
      fit = solveNonNegative(columns, this.#divided, this.#weight, prices, fit.active);
      if (fit.chiSquare + priceOf(fit, prices) < best.chiSquare + best.price) {
        best = assemble(components, columns, fit, factor, pixels, redshift);
      }
    }
    return best;
  }
}

function priceOf(fit: NonNegativeFit, prices: Float64Array): number {
  return fit.active.reduce((sum, j) => sum + prices[j]!, 0);
}

function assemble(
  components: readonly Component[],
  columns: Columns,
  fit: NonNegativeFit,
  factor: Float64Array,
  pixels: RefitPixels,
  redshift: number,
): Refit {
  const n = pixels.count;
  const model = new Float64Array(n);
  const continuum = new Float64Array(n);
  let price = 0;
  const active = fit.active.map((j, k) => {
    const component = components[j]!;
    const amplitude = fit.amplitudes[k]!;
    const isLine = component.role === 'narrow-line' || component.role === 'broad-line';
    price += PRICE[component.role];
    for (let i = columns.first[j]!; i < columns.end[j]!; i++) {
      const value = amplitude * columns.values[j * n + i]! * factor[i]!;
      model[i]! += value;
      if (!isLine) continuum[i]! += value;
    }
    return { component, amplitude };
  });
  return { redshift, chiSquare: fit.chiSquare, price, active, activeIndices: fit.active, model, continuum };
}
