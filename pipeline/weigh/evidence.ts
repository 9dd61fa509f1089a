import type { Kind } from '../../templates/family.ts';
import type { MeasuredSpectrum, Measurement } from '../measure/index.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;

/**
 * Two redshifts nearer than this say the same thing, km/s in c·Δz/(1+z): the limits within which `confidence`
 * calls an answer right (names of the catalogue columns state them).
 */
export const SAME_REDSHIFT_KM_S: Readonly<Record<Kind, number>> = { star: 100, galaxy: 300, quasar: 1_500 };

/**
 * What searching costs, in chi-square: 2 ln(number of independent trials). Noise alone offers the best of N
 * trials, whose expected gain is 2 ln N. Stars: about 45 velocities × 7 families less their strong overlap;
 * galaxies: a range of 1 in ln(1+z) over valleys of 150 km/s, × 2 line widths; quasars: a range of 2 over
 * valleys of 1,000 km/s (600 of them) × a few tens of free line shapes. On real spectra scaled down onto real
 * sky residuals the share of right answers is flat to 1 per cent between 12 and 34 for quasars and 13 and 21
 * for galaxies.
 */
export const LOOK_ELSEWHERE: Readonly<Record<Kind, number>> = { star: 9, galaxy: 17, quasar: 20 };

/** Prior weight of each kind; need not sum to one. */
export type KindPrior = Readonly<Record<Kind, number>>;
export const FLAT_PRIOR: KindPrior = { star: 1, galaxy: 1, quasar: 1 };

/** One distinct answer: all measurements of one kind that agree on the redshift, led by the best. */
export interface Hypothesis {
  readonly best: Measurement;
  /** Effective chi-square plus the prices of freedom, search and −2 ln prior; smaller is better. */
  readonly cost: number;
  readonly probability: number;
}

export interface Posterior {
  /** Best first. */
  readonly hypotheses: readonly Hypothesis[];
  readonly probabilityNone: number;
  readonly byKind: Readonly<Record<Kind, number>>;
}

/**
 * Bayes' rule over the distinct hypotheses and 'none of these'. The marginal likelihood of a hypothesis is
 * exp(−cost/2): Laplace's approximation with the Occam factor of each amplitude and of the search carried as
 * a chi-square price.
 *
 * @param inflation effective variance over stated variance, >= 1: factor² × (1 + 2 Σ correlation)
 */
export function posterior(measured: MeasuredSpectrum, inflation: number, prior: KindPrior): Posterior {
  const costs = measured.measurements
    .map((best) => ({ best, cost: costOf(best, inflation) - 2 * Math.log(prior[best.kind]) }))
    .sort((a, b) => a.cost - b.cost);
  const distinct: { best: Measurement; cost: number }[] = [];
  for (const one of costs) {
    if (!distinct.some((known) => sayTheSame(known.best, one.best))) distinct.push(one);
  }
  const noneCost = measured.emptyChiSquare / inflation;
  const lowest = Math.min(noneCost, distinct[0]?.cost ?? Infinity);
  const weights = distinct.map(({ cost }) => Math.exp(-0.5 * (cost - lowest)));
  const noneWeight = Math.exp(-0.5 * (noneCost - lowest));
  const total = weights.reduce((sum, w) => sum + w, noneWeight);
  const byKind: Record<Kind, number> = { star: 0, galaxy: 0, quasar: 0 };
  const hypotheses = distinct.map(({ best, cost }, k) => {
    const probability = weights[k]! / total;
    byKind[best.kind] += probability;
    return { best, cost, probability };
  });
  return {
    hypotheses,
    probabilityNone: noneWeight / total,
    byKind,
  };
}

/** Effective chi-square of a hypothesis with all its prices. */
export function costOf(measurement: Measurement, inflation: number): number {
  return measurement.refit.chiSquare / inflation + measurement.refit.price + LOOK_ELSEWHERE[measurement.kind];
}

/** Same kind, and redshifts within the kind's limit. */
export function sayTheSame(a: Measurement, b: Measurement): boolean {
  return a.kind === b.kind && separationKmS(a.redshift, b.redshift) < SAME_REDSHIFT_KM_S[a.kind];
}

/** |c·Δz/(1+z)| in km/s. */
export function separationKmS(z1: number, z2: number): number {
  return (SPEED_OF_LIGHT_KM_S * Math.abs(z1 - z2)) / (1 + z1);
}

/**
 * Resampling correlates neighbours at up to 0.3 and pixels two apart at up to 0.1 (measured on real co-adds), an
 * inflation of 1.8. More than this is no noise but structure the smoothing left in: absorption forests, bands.
 */
const MOST_INFLATION = 2;

/**
 * Effective variance over the variance of one pixel: 1 + 2 Σ correlation over the lags given, from 1 to 2. A
 * smooth model averages neighbouring pixels, whose noise does not average out.
 */
export function noiseInflation(correlation: readonly number[]): number {
  const whole = 1 + 2 * correlation.reduce((sum, rho) => sum + rho, 0);
  return Math.min(Math.max(1, whole), MOST_INFLATION);
}
