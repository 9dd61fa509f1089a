import type { Calibration } from './calibration.ts';

export const CALIBRATION: Calibration = {
  id: 'start-1',
  kinds: {
    galaxy: { constant: -1.5, weights: { lnMargin: 1.2 } },
    quasar: { constant: -1.5, weights: { lnMargin: 1.2 } },
    star: { constant: -1.5, weights: { lnMargin: 1.2 } },
  },
};
