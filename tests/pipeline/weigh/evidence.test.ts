import { describe, expect, it } from 'vitest';
import type { MeasuredSpectrum } from '../../../pipeline/measure/index.ts';
import {
  FLAT_PRIOR,
  LOOK_ELSEWHERE,
  noiseInflation,
  posterior,
  separationKmS,
} from '../../../pipeline/weigh/evidence.ts';
import { someMeasurement, somePixels } from './a-case.ts';

function measured(...measurements: MeasuredSpectrum['measurements']): MeasuredSpectrum {
  return { pixels: somePixels(), measurements, emptyChiSquare: 2_000, emptyFreedom: 8 };
}

describe('posterior()', () => {
  it('gives two equal rivals one half each', () => {
    const { hypotheses } = posterior(
      measured(someMeasurement('galaxy', 0.3, 600), someMeasurement('galaxy', 0.7, 600)),
      1,
      FLAT_PRIOR,
    );
    expect(hypotheses.map((h) => h.probability)).toEqual([0.5, 0.5]);
  });

  it('gives odds of exp(Δχ²/2) between kinds with the same price of search (likelihood ratio)', () => {
    const { hypotheses } = posterior(
      measured(someMeasurement('galaxy', 0.3, 600), someMeasurement('galaxy', 0.7, 606)),
      1,
      FLAT_PRIOR,
    );
    expect(hypotheses[0]!.probability / hypotheses[1]!.probability).toBeCloseTo(Math.exp(3), 6);
  });

  it('counts refits that agree on kind and redshift as one answer', () => {
    const { hypotheses } = posterior(
      measured(someMeasurement('star', 0, 600), someMeasurement('star', 0.0001, 601)),
      1,
      FLAT_PRIOR,
    );
    expect(hypotheses).toHaveLength(1);
    expect(hypotheses[0]!.best.redshift).toBe(0);
  });

  it('moves the odds by the ratio of the priors', () => {
    const two = measured(someMeasurement('galaxy', 0.3, 600), someMeasurement('quasar', 1.5, 600));
    const odds = (prior: typeof FLAT_PRIOR): number => {
      const { byKind } = posterior(two, 1, prior);
      return byKind.quasar / byKind.galaxy;
    };
    expect(odds({ ...FLAT_PRIOR, quasar: 5 }) / odds(FLAT_PRIOR)).toBeCloseTo(5, 9);
  });

  it('prefers "none" when no template earns the price of its search', () => {
    const emptyChiSquare = 600 + LOOK_ELSEWHERE.galaxy - 10;
    const one = { ...measured(someMeasurement('galaxy', 0.3, 600)), emptyChiSquare };
    const { probabilityNone } = posterior(one, 1, FLAT_PRIOR);
    expect(probabilityNone).toBeCloseTo(1 / (1 + Math.exp(-5)), 9);
  });

  it('sums to one', () => {
    const { byKind, probabilityNone } = posterior(
      measured(
        someMeasurement('star', 0, 605),
        someMeasurement('galaxy', 0.3, 600),
        someMeasurement('quasar', 1, 602),
      ),
      1.4,
      { star: 2, galaxy: 3, quasar: 0.5 },
    );
    expect(byKind.star + byKind.galaxy + byKind.quasar + probabilityNone).toBeCloseTo(1, 12);
  });

  it('has no hypothesis and full "none" when nothing was measured', () => {
    expect(posterior(measured(), 1, FLAT_PRIOR)).toMatchObject({ hypotheses: [], probabilityNone: 1 });
  });
});

describe('noiseInflation()', () => {
  it('is 1 + 2 Σρ: 1.5 for neighbours correlated at 0.25', () => {
    expect(noiseInflation([0.25, 0, 0])).toBeCloseTo(1.5, 12);
  });

  it('never goes above two: an absorption forest is structure, not noise', () => {
    expect(noiseInflation([0.63, 0.49, 0.49, 0.36])).toBe(2);
  });

  it('never goes below one: noise is never called better than stated', () => {
    expect(noiseInflation([-0.3, -0.1])).toBe(1);
  });
});

describe('separationKmS()', () => {
  it('is c·Δz/(1+z)', () => {
    expect(separationKmS(1, 1.002)).toBeCloseTo(299.792458, 6);
  });
});
