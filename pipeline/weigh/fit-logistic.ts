import { solvePositiveDefinite } from '../core/solve-positive-definite.ts';

/** One example: what was known, and how right it was (0 … 1). */
export interface LogisticExample {
  readonly features: readonly number[];
  readonly target: number;
}

export interface LogisticFit {
  readonly constant: number;
  readonly weights: readonly number[];
}

const MOST_ROUNDS = 60;
const SETTLED = 1e-10;

/**
 * Maximum-likelihood logistic regression by Newton's method (iteratively reweighted least squares), with a
 * ridge on the weights (not on the constant) that keeps them finite where the examples are separable.
 *
 * @param ridge penalty ridge/2 × Σ weight² added to the negative log-likelihood; features should be of order one
 * @throws RangeError when there are no examples or they have different numbers of features
 */
export function fitLogistic(examples: readonly LogisticExample[], ridge: number): LogisticFit {
  const width = examples[0]?.features.length;
  if (width === undefined) throw new RangeError('fitLogistic() needs at least one example, got 0');
  if (examples.some((one) => one.features.length !== width)) {
    throw new RangeError(`fitLogistic() needs ${width} features in every example`);
  }
  const terms = width + 1;
  let beta = new Array<number>(terms).fill(0);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const { gradient, hessian } = derivatives(examples, beta, ridge);
    const step = solvePositiveDefinite(hessian, gradient);
    // Half steps when a full Newton step would leave the region where the quadratic holds.
    const longest = Math.max(...step.map(Math.abs));
    const scale = longest > 4 ? 4 / longest : 1;
    beta = beta.map((b, k) => b - scale * step[k]!);
    if (longest < SETTLED) break;
  }
  return { constant: beta[0]!, weights: beta.slice(1) };
}

function derivatives(
  examples: readonly LogisticExample[],
  beta: readonly number[],
  ridge: number,
): { gradient: number[]; hessian: number[][] } {
  const terms = beta.length;
  const gradient = beta.map((b, k) => (k === 0 ? 0 : ridge * b));
  const hessian = beta.map((_, j) => beta.map((__, k) => (j === k ? (j === 0 ? 1e-9 : ridge + 1e-9) : 0)));
  for (const { features, target } of examples) {
    const x = [1, ...features];
    const p = 1 / (1 + Math.exp(-x.reduce((sum, v, k) => sum + v * beta[k]!, 0)));
    for (let j = 0; j < terms; j++) {
      gradient[j]! += (p - target) * x[j]!;
      for (let k = 0; k < terms; k++) hessian[j]![k]! += p * (1 - p) * x[j]! * x[k]!;
    }
  }
  return { gradient, hessian };
}
