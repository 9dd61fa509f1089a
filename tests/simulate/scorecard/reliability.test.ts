import { expect, it } from 'vitest';
import { reliabilityOf } from '../../../simulate/scorecard/reliability.ts';

// Sixteen forecasts; scores by scikit-learn 1.2.1 (Brier) and by hand in bins closed on the right.
const STATED = [
  0.05, 0.12, 0.18, 0.27, 0.35, 0.42, 0.48, 0.55, 0.61, 0.68, 0.74, 0.79, 0.85, 0.91, 0.97, 0.99,
];
const CAME_TRUE = [0, 0, 1, 0, 0, 1, 0, 1, 1, 0, 1, 1, 1, 0, 1, 1];
const FORECASTS = STATED.map((probability, i) => ({ probability, cameTrue: CAME_TRUE[i] === 1 }));

it('reliabilityOf() gives the published Brier score', () => {
  expect(reliabilityOf(FORECASTS, 10).brierScore).toBeCloseTo(0.2019875, 12);
});

it.each([
  [4, 0.13125],
  [5, 0.17],
  [10, 0.23125],
])('with %i bins the calibration error is %f', (bins, error) => {
  expect(reliabilityOf(FORECASTS, bins).expectedCalibrationError).toBeCloseTo(error, 12);
});

it('a forecast on a bin’s edge belongs to the bin below, and 0 to the first', () => {
  const { bins } = reliabilityOf(
    [0, 0.5, 1].map((probability) => ({ probability, cameTrue: true })),
    2,
  );
  expect(bins.map(({ cameTrue }) => cameTrue.of)).toEqual([2, 1]);
});

it('no forecasts have no score', () => {
  const { brierScore, expectedCalibrationError, bins } = reliabilityOf([], 3);
  expect([brierScore, expectedCalibrationError]).toEqual([null, null]);
  expect(bins.map(({ stated }) => stated)).toEqual([null, null, null]);
});
