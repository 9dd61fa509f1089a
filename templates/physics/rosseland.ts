import { SECOND_RADIATION } from './constants.ts';
import { continuumOpacity } from './continuum.ts';
import type { ContinuumSource } from './continuum.ts';

/** Geometric sequence from first to last, both included. */
const geometric = (first: number, last: number, count: number): number[] =>
  Array.from({ length: count }, (_, i) => first * (last / first) ** (i / (count - 1)));

/** Wavelengths (angstrom) of the mean: dense where the flux is, with the Balmer jump bracketed. */
export const ROSSELAND_WAVELENGTHS: readonly number[] = [
  ...geometric(920, 3500, 22),
  3600,
  3700,
  ...geometric(3900, 9000, 14),
  ...geometric(10000, 60000, 14),
];

/** exp of more than this is infinite for our purpose: dB/dT is zero. */
const GREATEST_EXPONENT = 200;

/** Width in centimetre of each wavelength sample: central differences of ln(wavelength). */
function sampleWidths(wavelengths: readonly number[]): number[] {
  const last = wavelengths.length - 1;
  return wavelengths.map((wavelength, i) => {
    const left = Math.max(i - 1, 0);
    const right = Math.min(i + 1, last);
    return ((Math.log(wavelengths[right]! / wavelengths[left]!) / (right - left)) * wavelength) / 1e8;
  });
}

/**
 * Rosseland mean of the continuous opacity, cm^-1, at every point: the harmonic mean with weights dB/dT
 * (Rosseland 1924; e.g. Gray 2005, section 7).
 */
export function rosselandMean(source: ContinuumSource): Float64Array {
  const { gas } = source;
  const weights = new Float64Array(gas.length);
  const inverse = new Float64Array(gas.length);
  const opacity = new Float64Array(gas.length);
  const widths = sampleWidths(ROSSELAND_WAVELENGTHS);
  for (const [sample, wavelength] of ROSSELAND_WAVELENGTHS.entries()) {
    continuumOpacity(source, wavelength, opacity);
    const centimetre = wavelength * 1e-8;
    for (let point = 0; point < gas.length; point += 1) {
      const t = gas.temperature[point]!;
      const exponent = Math.min(SECOND_RADIATION / (centimetre * t), GREATEST_EXPONENT);
      const e = Math.exp(exponent);
      const weight = (e / (e - 1) ** 2 / centimetre ** 6 / (t * t)) * widths[sample]!;
      weights[point]! += weight;
      inverse[point]! += weight / opacity[point]!;
    }
  }
  return weights.map((weight, point) => weight / inverse[point]!);
}
