import { describe, expect, it } from 'vitest';
import { fitLogistic } from '../../../pipeline/weigh/fit-logistic.ts';

/** Sixteen forecasts and outcomes; fits computed with scikit-learn 1.2.1 and scipy 1.10 (BFGS). */
const FORECAST = [
  0.05, 0.12, 0.18, 0.27, 0.35, 0.42, 0.48, 0.55, 0.61, 0.68, 0.74, 0.79, 0.85, 0.91, 0.97, 0.99,
];
const OUTCOME = [0, 0, 1, 0, 0, 1, 0, 1, 1, 0, 1, 1, 1, 0, 1, 1];
/** Platt 1999's smoothed targets for 9 successes and 7 failures. */
const TARGET = OUTCOME.map((y) => (y === 1 ? 10 / 11 : 1 / 9));

describe('fitLogistic()', () => {
  it("reproduces Platt's scaling of log-odds: A = −0.44158, B = −0.08723", () => {
    const examples = FORECAST.map((p, i) => ({ features: [Math.log(p / (1 - p))], target: TARGET[i]! }));
    const fit = fitLogistic(examples, 0);
    expect(-fit.weights[0]!).toBeCloseTo(-0.44158494, 5);
    expect(-fit.constant).toBeCloseTo(-0.08723465, 5);
  });

  it("reproduces Platt's scaling of plain scores: A = −2.62102, B = 1.19739", () => {
    const examples = FORECAST.map((p, i) => ({ features: [p], target: TARGET[i]! }));
    const fit = fitLogistic(examples, 0);
    expect(-fit.weights[0]!).toBeCloseTo(-2.621019, 5);
    expect(-fit.constant).toBeCloseTo(1.197385, 5);
  });

  it('stays finite on separable examples because of the ridge', () => {
    const examples = [-2, -1, 1, 2].map((x) => ({ features: [x], target: x > 0 ? 1 : 0 }));
    const fit = fitLogistic(examples, 0.1);
    expect(Number.isFinite(fit.weights[0])).toBe(true);
    expect(fit.weights[0]!).toBeGreaterThan(1);
  });

  it('refuses no examples and uneven ones', () => {
    expect(() => fitLogistic([], 1)).toThrow(RangeError);
    expect(() =>
      fitLogistic(
        [
          { features: [1], target: 0 },
          { features: [], target: 1 },
        ],
        1,
      ),
    ).toThrow(RangeError);
  });
});
