import type { Kind } from '../../templates/family.ts';
import type { LineMeasurement } from './line-measurement.ts';
import type { Refit } from './refit.ts';
import type { RefitPixels } from './refit-pixels.ts';
import { REST_LINES, type LineNature, type RestLine } from './rest-lines.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;
/** Intrinsic Gaussian sigma used to weigh a line of each nature, km/s (added to the line spread in quadrature). */
const WIDTH_KM_S: Readonly<Record<LineNature, number>> = { narrow: 80, broad: 1_800, absorption: 120 };
/** A line is measured when this share of its weighted window carries data. */
const LEAST_COVERAGE = 0.6;

/** Below this the lines that are broad in quasars are narrow in distant galaxies, Lyα first of all. */
const ULTRAVIOLET_ANGSTROM = 2_000;

/** As what a line is measured in a kind of object; null = not at all. */
function seenAs(rest: RestLine, kind: Kind): LineNature | null {
  if (rest.nature === 'absorption') return kind === 'quasar' ? null : 'absorption';
  if (rest.nature === 'narrow' || kind === 'quasar') return rest.nature;
  return kind === 'galaxy' && rest.wavelengthVacuumAngstrom < ULTRAVIOLET_ANGSTROM ? 'narrow' : null;
}

/**
 * Measures every listed line that falls on usable pixels at the refit's redshift: the linear amplitude of a
 * Gaussian of fixed width on the residual over the model's continuum, weighted by the errors. Emission lines
 * are measured over the line-free part of the model. Absorption lines lie inside that continuum, so what is
 * given for them is what the data hold beyond a straight line between the borders of their window.
 *
 * @param lineSpreadSigmaKmS Gaussian sigma of the instrument
 * @param noiseInflation effective variance over stated variance, >= 1: divides the signal-to-noise by its root
 */
export function measureLines(
  pixels: RefitPixels,
  refit: Refit,
  kind: Kind,
  lineSpreadSigmaKmS: number,
  noiseInflation: number,
): LineMeasurement[] {
  const found: LineMeasurement[] = [];
  for (const rest of REST_LINES) {
    const nature = seenAs(rest, kind);
    if (nature === null) continue;
    const one = measureLine(pixels, refit, { ...rest, nature }, lineSpreadSigmaKmS, noiseInflation);
    if (one) found.push(one);
  }
  return found;
}

function measureLine(
  pixels: RefitPixels,
  refit: Refit,
  rest: RestLine,
  lineSpreadSigmaKmS: number,
  noiseInflation: number,
): LineMeasurement | null {
  const observed = rest.wavelengthVacuumAngstrom * (1 + refit.redshift);
  const sigmaLn = Math.hypot(WIDTH_KM_S[rest.nature], lineSpreadSigmaKmS) / SPEED_OF_LIGHT_KM_S;
  const centre = Math.log(observed);
  const baseline = rest.nature === 'absorption' ? straightLine(pixels, centre, sigmaLn) : refit.continuum;
  if (!baseline) return null;
  let product = 0;
  let square = 0;
  let level = 0;
  let levelWeight = 0;
  let covered = 0;
  for (let i = 0; i < pixels.count; i++) {
    const ln = 0.5 * (pixels.lnLow[i]! + pixels.lnHigh[i]!);
    const x = (ln - centre) / sigmaLn;
    if (Math.abs(x) > 3) continue;
    const profile = Math.exp(-0.5 * x * x);
    const w = pixels.weight[i]! / noiseInflation;
    product += w * profile * (pixels.flux[i]! - baseline[i]!);
    square += w * profile * profile;
    level += profile * baseline[i]!;
    levelWeight += profile;
    covered += profile * (pixels.lnHigh[i]! - pixels.lnLow[i]!);
  }
  const wholeProfile = sigmaLn * Math.sqrt(2 * Math.PI);
  if (square <= 0 || covered < LEAST_COVERAGE * wholeProfile) return null;
  const peak = product / square;
  const peakError = 1 / Math.sqrt(square);
  const widthAngstrom = wholeProfile * observed;
  const continuum = level / levelWeight;
  return {
    name: rest.name,
    wavelengthRestVacuumAngstrom: rest.wavelengthVacuumAngstrom,
    wavelengthObservedAngstrom: observed,
    flux: peak * widthAngstrom * pixels.fluxScale,
    fluxError: peakError * widthAngstrom * pixels.fluxScale,
    equivalentWidthAngstrom:
      continuum > peakError ? ((peak / continuum) * widthAngstrom) / (1 + refit.redshift) : null,
    signalToNoise: peak / peakError,
  };
}

/** Straight line through the data on both sides of a window (3 to 6 sigma), or null when a side is empty. */
function straightLine(pixels: RefitPixels, centre: number, sigmaLn: number): Float64Array | null {
  const side = (from: number, to: number): { at: number; level: number } | null => {
    let sum = 0;
    let weight = 0;
    for (let i = 0; i < pixels.count; i++) {
      const x = (0.5 * (pixels.lnLow[i]! + pixels.lnHigh[i]!) - centre) / sigmaLn;
      if (x < from || x > to) continue;
      sum += pixels.weight[i]! * pixels.flux[i]!;
      weight += pixels.weight[i]!;
    }
    return weight > 0 ? { at: 0.5 * (from + to), level: sum / weight } : null;
  };
  const left = side(-6, -3);
  const right = side(3, 6);
  if (!left || !right) return null;
  const slope = (right.level - left.level) / (right.at - left.at);
  const baseline = new Float64Array(pixels.count);
  for (let i = 0; i < pixels.count; i++) {
    const x = (0.5 * (pixels.lnLow[i]! + pixels.lnHigh[i]!) - centre) / sigmaLn;
    baseline[i] = left.level + slope * (x - left.at);
  }
  return baseline;
}
