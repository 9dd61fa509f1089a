import { describe, expect, it } from 'vitest';
import { intergalacticTransmission } from '../../../templates/intergalactic/madau.ts';

/** Madau 1995 evaluated by an independent script: redshift, rest Å, transmission. */
const PUBLISHED: readonly (readonly [redshift: number, rest: number, transmission: number])[] = [
  [2, 900, 0.737693],
  [2, 930, 0.816638],
  [2, 1000, 0.859282],
  [2, 1100, 0.892259],
  [2, 1200, 0.857234],
  [3, 900, 0.468235],
  [3, 960, 0.610517],
  [3, 1100, 0.734584],
  [3, 1200, 0.659148],
  [4, 930, 0.305386],
  [4, 1000, 0.411437],
  [4, 1200, 0.405726],
  [5, 900, 0.055871],
  [5, 1100, 0.285225],
  [5, 1200, 0.18357],
  [6, 960, 0.03268],
  [6, 1200, 0.055595],
];

describe('intergalacticTransmission()', () => {
  it.each(PUBLISHED)(
    'at redshift %f and %f Å equals Madau 1995 within 1e-6',
    (redshift, rest, transmission) => {
      expect(Math.abs(intergalacticTransmission(rest, redshift) - transmission)).toBeLessThan(1e-6);
    },
  );

  it('lets everything through redward of Lyα', () => {
    for (const redshift of [0, 2, 5, 7]) expect(intergalacticTransmission(1216, redshift)).toBe(1);
  });

  it('stays between 0 and 1 and falls with redshift', () => {
    for (let rest = 700; rest < 1215; rest += 5) {
      let before = 1;
      for (let redshift = 0; redshift <= 7; redshift += 0.5) {
        const now = intergalacticTransmission(rest, redshift);
        expect(now).toBeGreaterThanOrEqual(0);
        // Falls everywhere but where a higher line's forest begins at the low end: allow rounding only.
        expect(now).toBeLessThanOrEqual(before + 1e-12);
        before = now;
      }
    }
  });
});
