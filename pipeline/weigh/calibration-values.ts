import type { Calibration } from './calibration.ts';

/**
 * Written by tools/fit-calibration.ts; docs/quality.md says from which examples. Never edited by hand.
 */
export const CALIBRATION: Calibration = {
  id: 'first-light-2026-12',
  kinds: {
    galaxy: {
      constant: -4.5109,
      weights: {
        lnMargin: 1.5127,
        lnReducedChiSquare: -2.8718,
        correlationAgrees: 0.49584,
        restsOnOneLine: -0.17493,
      },
    },
    quasar: {
      constant: -5.4869,
      weights: {
        lnMargin: 0.59563,
        lnReducedChiSquare: -1.2515,
        correlationAgrees: 1.8469,
        lnStrongestLine: 1.3866,
      },
    },
    star: {
      constant: -4.3498,
      weights: {
        lnMargin: 0.88156,
        lnMarginOverNone: 0.36041,
        lnReducedChiSquare: -1.6494,
        correlationR: 0.70935,
      },
    },
  },
};
