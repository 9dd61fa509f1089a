import { type Share, shareOf } from './binomial.ts';

/** A stated probability and whether what it spoke of came true. */
export interface Forecast {
  /** 0..1. */
  readonly probability: number;
  readonly cameTrue: boolean;
}

/** Forecasts of about the same probability. */
export interface ReliabilityBin {
  /** Probabilities above `from` (the first bin: from 0 on) up to and with `to`. */
  readonly from: number;
  readonly to: number;
  /** Mean stated probability; null when the bin is empty. */
  readonly stated: number | null;
  readonly cameTrue: Share;
}

export interface Reliability {
  /** Mean of (probability − outcome)² (Brier 1950, Mon. Weather Rev. 78, 1); null without forecasts. */
  readonly brierScore: number | null;
  /** Mean over forecasts of |stated − came true| of their bin (Naeini et al. 2015; Guo et al. 2017). */
  readonly expectedCalibrationError: number | null;
  readonly bins: readonly ReliabilityBin[];
}

/** Compares what was stated with what came true, in `binCount` bins of equal width, ≥ 1. */
export function reliabilityOf(forecasts: readonly Forecast[], binCount: number): Reliability {
  const members: Forecast[][] = Array.from({ length: binCount }, () => []);
  for (const forecast of forecasts) {
    const bin = Math.ceil(forecast.probability * binCount) - 1;
    members[Math.min(binCount - 1, Math.max(0, bin))]!.push(forecast);
  }
  const bins = members.map((inside, i): ReliabilityBin => {
    const right = inside.filter(({ cameTrue }) => cameTrue).length;
    return {
      from: i / binCount,
      to: (i + 1) / binCount,
      stated: mean(inside.map(({ probability }) => probability)),
      cameTrue: shareOf(right, inside.length),
    };
  });
  const gaps = bins.flatMap(({ stated, cameTrue }) =>
    stated === null || cameTrue.value === null ? [] : [cameTrue.of * Math.abs(stated - cameTrue.value)],
  );
  return {
    brierScore: mean(forecasts.map(({ probability, cameTrue }) => (probability - Number(cameTrue)) ** 2)),
    expectedCalibrationError:
      forecasts.length === 0 ? null : gaps.reduce((sum, gap) => sum + gap, 0) / forecasts.length,
    bins,
  };
}

function mean(values: readonly number[]): number | null {
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length;
}
