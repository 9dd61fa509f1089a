import type { Reason } from '../answer.ts';
import type { Case } from '../case.ts';
import { emissionLines, LINE_SEEN_SIGMA, lineNamed } from './emission.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;
/** Without its one line, an answer must still lead by this much or it rests on that line (3 sigma). */
const STANDS_ALONE_MARGIN = 9;
/** Strongest night-sky emission lines, vacuum ångström (Osterbrock et al. 1996, PASP 108, 277). */
const SKY_LINES = [5578.8868, 5891.5834, 5897.558, 6302.0465, 6365.5355];
/** Edges of the strong atmospheric bands of O2 and H2O, vacuum ångström (common practice, no source). */
const ATMOSPHERIC_BANDS = [
  [6869, 6946],
  [7596, 7702],
] as const;
const NEAR_SKY_KM_S = 250;
/** [O III] 5008/4960 = 2.98 and [N II] 6585/6550 = 3.05 (Storey & Zeippen 2000, MNRAS 312, 813). */
const FIXED_RATIOS = [
  ['[O III] 5008', '[O III] 4960', 2.98],
  ['[N II] 6585', '[N II] 6550', 3.05],
] as const;
/** Lines are measured with one fixed width, blends with it: only a ratio off by a factor of two says something. */
const IMPOSSIBLE_FACTOR = 2;
/** Ratio defects below this many sigma are noise. */
const IMPOSSIBLE_SIGMA = 5;
/** The features that settle a galaxy between 3,600 and 9,500 Å. */
const DECIDING = ['[O II] 3728', 'Ca II K', 'Ca II H', 'Hβ', '[O III] 5008', 'Hα'];

/** The answer rests on a single emission line. */
export function loneLine(one: Case): Reason | null {
  if (one.best.best.kind === 'star') return null;
  const seen = emissionLines(one);
  const strongest = seen[0];
  if (!strongest || seen.length > 1) return null;
  const without = one.margin - strongest.signalToNoise ** 2;
  if (without >= STANDS_ALONE_MARGIN) return null;
  return {
    word: 'lone-line',
    weight: 'look',
    sentence: `The answer rests on one emission line at ${strongest.wavelengthObservedAngstrom.toFixed(1)} Å (${strongest.signalToNoise.toFixed(1)} sigma), taken for ${strongest.name}.`,
    numbers: {
      wavelengthAngstrom: strongest.wavelengthObservedAngstrom,
      signalToNoise: strongest.signalToNoise,
    },
  };
}

/** The deciding line sits on a night-sky line or in an atmospheric band. */
export function skyLine(one: Case): Reason | null {
  const seen = emissionLines(one);
  const strongest = seen[0];
  if (!strongest || one.best.best.kind === 'star') return null;
  const lambda = strongest.wavelengthObservedAngstrom;
  const near = SKY_LINES.find((sky) => (SPEED_OF_LIGHT_KM_S * Math.abs(lambda - sky)) / sky < NEAR_SKY_KM_S);
  const band = ATMOSPHERIC_BANDS.find(([from, to]) => lambda > from && lambda < to);
  if (near === undefined && !band) return null;
  const others = seen.slice(1).reduce((sum, l) => sum + l.signalToNoise ** 2, 0);
  if (others >= STANDS_ALONE_MARGIN * 2) return null;
  const what =
    near === undefined
      ? `the atmospheric band ${band![0]}–${band![1]} Å`
      : `the night-sky line at ${near.toFixed(1)} Å`;
  return {
    word: 'sky-line',
    weight: 'look',
    sentence: `The deciding feature, ${strongest.name} at ${lambda.toFixed(1)} Å, lies on ${what}.`,
    numbers: { wavelengthAngstrom: lambda, signalToNoise: strongest.signalToNoise },
  };
}

/** A line ratio outside what atoms allow. */
export function impossibleLines(one: Case): Reason | null {
  if (one.best.best.kind !== 'galaxy') return null;
  for (const [strong, weak, ratio] of FIXED_RATIOS) {
    const a = lineNamed(one, strong);
    const b = lineNamed(one, weak);
    if (!a || !b) continue;
    // Only the weak line too strong is impossible; a strong line may hide in noise or sky.
    const most = (IMPOSSIBLE_FACTOR * a.flux) / ratio;
    const excess = b.flux - most;
    const sigma = Math.hypot(b.fluxError, (IMPOSSIBLE_FACTOR * a.fluxError) / ratio);
    if (b.signalToNoise < LINE_SEEN_SIGMA || excess < IMPOSSIBLE_SIGMA * sigma) continue;
    return {
      word: 'impossible-lines',
      weight: 'look',
      sentence: `${weak} is ${(excess / sigma).toFixed(1)} sigma stronger than ${strong} allows (ratio ${(a.flux / b.flux).toFixed(2)}, atoms give ${ratio}).`,
      numbers: { ratio: a.flux / b.flux, allowed: ratio, sigma: excess / sigma },
    };
  }
  return null;
}

/** The lines that would decide fall where there are no data. */
export function gaps(one: Case, confidence: number, reviewConfidence: number): Reason | null {
  if (one.best.best.kind !== 'galaxy' || confidence >= reviewConfidence) return null;
  const { arms, lnLow, lnHigh } = one.measured.pixels;
  const filled = arms.filter((arm) => arm.end > arm.first);
  const lowest = Math.exp(Math.min(...filled.map((arm) => lnLow[arm.first]!)));
  const highest = Math.exp(Math.max(...filled.map((arm) => lnHigh[arm.end - 1]!)));
  const z = one.best.best.redshift;
  const expected = DECIDING_WAVELENGTHS.filter((rest) => rest * (1 + z) > lowest && rest * (1 + z) < highest);
  const present = DECIDING.filter((name) => lineNamed(one, name));
  const lost = expected.length - present.length;
  if (lost < 1 || lost < expected.length / 2) return null;
  return {
    word: 'gaps',
    weight: 'look',
    sentence: `${lost} of the ${expected.length} features that would decide fall on masked or missing pixels.`,
    numbers: { lost, expected: expected.length },
  };
}

const DECIDING_WAVELENGTHS = [3728.68, 3934.7767, 3969.5918, 4862.6829, 5008.2396, 6564.6081];
