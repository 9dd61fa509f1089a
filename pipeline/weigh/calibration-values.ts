import type { Calibration } from './calibration.ts';

/**
 * Written by tools/fit-calibration.ts; docs/quality.md says from which examples. Never edited by hand.
 */
export const CALIBRATION: Calibration = {
  id: 'start-2026-12',
  kinds: {
    galaxy: {
      constant: -6.062,
      weights: {
        lnMargin: 1.4209,
        lnReducedChiSquare: -2.0475,
        correlationAgrees: 0.87557,
        correlationR: 0.8115,
      },
    },
    quasar: {
      constant: -4.9081,
      weights: {
        lnMargin: 0.47919,
        lnReducedChiSquare: -0.9512,
        correlationAgrees: 2.0348,
        lnStrongestLine: 1.1969,
      },
    },
    star: {
      constant: -4.1756,
      weights: {
        lnMargin: 0.84851,
        lnMarginOverNone: 0.34243,
        lnReducedChiSquare: -1.4797,
        correlationR: 0.70867,
      },
    },
  },
};
