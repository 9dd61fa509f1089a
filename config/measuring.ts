import type { OptionDescription } from './option.ts';

/**
 * Everything that may change a measured number. The recipe hash covers all of it: rows measured with other
 * values stand beside these, they are never overwritten.
 */
export interface MeasuringOptions {
  readonly gridStepLn: number;
  readonly reviewConfidence: number;
  readonly defaultLineSpreadKmS: number;
  readonly resolvingPower: number | null;
  readonly templateMismatch: number;
  readonly priorGalaxy: number;
  readonly priorQuasar: number;
  readonly priorStar: number;
}

/** Each option of the measurement with its unit, range, default and why. */
export const MEASURING_OPTIONS: {
  readonly [K in keyof MeasuringOptions]: OptionDescription<MeasuringOptions[K]>;
} = {
  gridStepLn: {
    unit: 'in ln(wavelength)',
    range: [2e-5, 2e-3],
    default: Math.LN10 * 1e-4,
    why: 'step of the search grid; 0.0001 in log10 is 69 km/s, the pixel of a spectrograph of R about 2000, so the grid neither loses detail nor repeats it',
  },
  reviewConfidence: {
    unit: 'probability',
    range: [0, 1],
    default: 0.9,
    why: 'answers less probable than this ask for a person; at 0.9 one accepted answer in ten may be wrong at worst, and far fewer are in the mean',
  },
  defaultLineSpreadKmS: {
    unit: 'km/s, Gaussian sigma',
    range: [5, 1000],
    default: 70,
    why: 'line spread when neither the file, the profile nor resolvingPower states it; R about 1800, a common survey spectrograph',
  },
  resolvingPower: {
    unit: 'wavelength over full width at half maximum',
    range: [100, 50_000],
    default: null,
    why: 'states the line spread where the file does not; none leaves it to defaultLineSpreadKmS',
  },
  templateMismatch: {
    unit: 'of the local flux, 1 sigma',
    range: [0, 0.2],
    default: 0.02,
    why: 'how far real objects differ from the best template; 2 per cent is what fits of bright spectra leave, and it keeps bright spectra from over-ruling everything by noise alone',
  },
  priorGalaxy: {
    unit: 'weight',
    range: [1e-6, 1],
    default: 0.5,
    why: 'share of galaxies expected before looking; broad, a survey sets its own from its target list',
  },
  priorQuasar: {
    unit: 'weight',
    range: [1e-6, 1],
    default: 0.15,
    why: 'share of quasars expected before looking; see priorGalaxy',
  },
  priorStar: {
    unit: 'weight',
    range: [1e-6, 1],
    default: 0.35,
    why: 'share of stars expected before looking; see priorGalaxy',
  },
};

/** The measurement as it is done when nobody changes anything. */
export const DEFAULT_MEASURING_OPTIONS: MeasuringOptions = Object.fromEntries(
  Object.entries(MEASURING_OPTIONS).map(([name, description]) => [name, description.default]),
) as unknown as MeasuringOptions;
