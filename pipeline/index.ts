import type { MeasuringOptions } from '../config/measuring.ts';
import type { FamilyLibrary } from '../templates/library.ts';
import { median } from './core/quantile.ts';
import type { Spectrum } from './decode/index.ts';
import { DEFAULT_GRID_OPTIONS, type ExposureContext, type Grid, toGrid } from './grid/index.ts';
import { chiSquareCurves, DEFAULT_MATCH_OPTIONS, matchFamilies, type MatchWorkspace } from './match/index.ts';
import { barycentricFrame, measureCandidates, measureLines, refitPixels } from './measure/index.ts';
import {
  type Answer,
  CALIBRATION,
  type Curves,
  curvesOf,
  noiseInflation,
  secondOpinion,
  weigh,
} from './weigh/index.ts';

export type { Answer, Curves } from './weigh/index.ts';

/** Raised with every change that moves a measured number: part of the recipe hash. */
export const RECIPE_VERSION = 1;

const SPEED_OF_LIGHT_KM_S = 299_792.458;
/** Full width at half maximum of a Gaussian of sigma 1. */
const FULL_WIDTH_PER_SIGMA = 2 * Math.sqrt(2 * Math.LN2);

/** Bins of the chi-square curve kept per kind: a page is about this many pixels wide. */
const SCAN_POINTS = 1_000;

/** Names of the stages, in a spectrum's order, as reported to `onStage` when each ends. */
export const STAGES = ['grid', 'match', 'measure', 'weigh'] as const;

/**
 * Measures one spectrum: what it is, its redshift or velocity, how sure that is, and why it may be doubted.
 * Pure: the same arguments give the same answer.
 *
 * @param context what the exposure says about its noise
 * @param library families, broadened on demand to this spectrum's line spread
 * @param onStage called with a stage's name when it ends, for timing
 * @throws InputFault when the spectrum holds too few usable pixels
 */
export function measureSpectrum(
  spectrum: Spectrum,
  context: ExposureContext,
  library: FamilyLibrary,
  options: MeasuringOptions,
  onStage: (stage: (typeof STAGES)[number]) => void = () => undefined,
  workspace?: MatchWorkspace,
): { answer: Answer; curves: Curves } {
  // Masks, noise check, flux-conserving rebin to uniform ln(wavelength).
  const grid = toGrid(spectrum, context, { ...DEFAULT_GRID_OPTIONS, step: options.gridStepLn });
  const lineSpread = lineSpreadOf(grid, options);
  const families = library.familiesFor(lineSpread.sigmaKmS);
  onStage('grid');

  // Chi-square at every lag of every family, and the cross-correlation beside it.
  const match = matchFamilies(
    grid,
    families,
    { ...DEFAULT_MATCH_OPTIONS, mismatch: options.templateMismatch },
    workspace,
  );
  onStage('match');

  // The best of them again on native pixels, with physical components and non-negative amplitudes.
  // The grid has applied the noise factor to every weight, so only the correlation inflates chi-square.
  const inflation = noiseInflation(grid.noiseCorrelation);
  const pixels = refitPixels(
    grid.arms.map((arm) => arm.native),
    options.templateMismatch,
  );
  const measured = measureCandidates(pixels, match.candidates, inflation);
  onStage('measure');

  // Evidence, probability, reasons.
  const frame = barycentricFrame(spectrum);
  const { answer, best, runnerUp } = weigh({
    measured,
    inflation,
    prior: { galaxy: options.priorGalaxy, quasar: options.priorQuasar, star: options.priorStar },
    calibration: CALIBRATION,
    reviewConfidence: options.reviewConfidence,
    linesOf: (one) => measureLines(pixels, one.refit, one.kind, lineSpread.sigmaKmS, inflation),
    secondOpinionOn: (one) => secondOpinion(match, one),
    signalToNoisePerAngstrom: grid.signalToNoisePerAngstrom,
    goodFraction: grid.goodFraction,
    noiseFactor: grid.noiseFactor,
    noiseCorrelation: grid.noiseCorrelation,
    noiseEstimated: grid.noiseSource === 'estimated',
    frame: spectrum.frame,
    lineSpreadSigmaKmS: lineSpread.sigmaKmS,
    lineSpreadStated: lineSpread.stated,
    barycentricVelocityKmS: frame.velocityKmS,
    barycentricSource: frame.source,
  });
  const curves = curvesOf(
    spectrum.arms,
    grid.arms,
    pixels,
    best,
    runnerUp,
    chiSquareCurves(match.families, SCAN_POINTS),
  );
  onStage('weigh');
  return { answer, curves };
}

/** Typical line spread over the used pixels, from the input, the resolving power option or the default. */
function lineSpreadOf(grid: Grid, options: MeasuringOptions): { sigmaKmS: number; stated: boolean } {
  const stated: number[] = [];
  for (const { native } of grid.arms) {
    native.lineSpreadSigmaKmS?.forEach((sigma, i) => {
      if (native.used[i] === 1 && sigma > 0 && Number.isFinite(sigma)) stated.push(sigma);
    });
  }
  if (stated.length > 0) return { sigmaKmS: median(stated), stated: true };
  if (options.resolvingPower !== null) {
    return { sigmaKmS: SPEED_OF_LIGHT_KM_S / options.resolvingPower / FULL_WIDTH_PER_SIGMA, stated: true };
  }
  return { sigmaKmS: options.defaultLineSpreadKmS, stated: false };
}
