import { expect, it } from 'vitest';
import { shareOf } from '../../../simulate/scorecard/binomial.ts';

// scipy 1.10.1, scipy.stats.binomtest(k, n).proportion_ci(0.95, method='wilson').
it.each([
  [0, 10, 0, 0.27753279986288926],
  [3, 40, 0.025836025774588198, 0.19864233524310543],
  [81, 263, 0.2552885198782742, 0.36620957698280004],
  [15, 148, 0.06238639953073629, 0.16048724172330803],
  [10, 10, 0.7224672001371109, 1],
])('shareOf(%i, %i) gives the interval scipy gives', (count, of, low, high) => {
  const share = shareOf(count, of);
  expect(share.low).toBeCloseTo(low, 12);
  expect(share.high).toBeCloseTo(high, 12);
});

it('nothing counted of nothing says nothing', () => {
  expect(shareOf(0, 0)).toEqual({ count: 0, of: 0, value: null, low: 0, high: 1 });
});
