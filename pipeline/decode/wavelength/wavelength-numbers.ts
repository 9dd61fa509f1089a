import type { WavelengthMeaning } from '../layout.ts';
import type { WavelengthUnit } from './wavelength-unit.ts';

/** Bounds of what is taken for optical and near-infrared light: 900 Å to 3 µm. */
export const SHORTEST_ANGSTROM = 900;
export const LONGEST_ANGSTROM = 30_000;

interface Reading {
  readonly unit: WavelengthUnit;
  readonly low: number;
  readonly high: number;
}

/** Ranges that do not overlap, so that numbers alone decide; each is 900 Å to 3 µm in its own unit. */
const READINGS: readonly Reading[] = [
  reading('linear', 1, SHORTEST_ANGSTROM, LONGEST_ANGSTROM),
  reading('linear', 10, SHORTEST_ANGSTROM / 10, 890),
  reading('linear', 1e10, SHORTEST_ANGSTROM * 1e-10, LONGEST_ANGSTROM * 1e-10),
  reading('log10', 1, Math.log10(SHORTEST_ANGSTROM), Math.log10(LONGEST_ANGSTROM)),
  reading('ln', 1, Math.log(SHORTEST_ANGSTROM), Math.log(LONGEST_ANGSTROM)),
  reading('linear', 1e4, SHORTEST_ANGSTROM / 1e4, 2.9),
];

function reading(meaning: WavelengthMeaning, angstrom: number, low: number, high: number): Reading {
  return { unit: { angstrom, meaning }, low, high };
}

/**
 * What a run of numbers must mean to be wavelengths of optical light: ångström, nm, µm, m, log10 Å or ln Å.
 *
 * @param lowest smallest of the numbers
 * @param highest largest of the numbers
 * @returns null when no reading holds both
 */
export function wavelengthUnitByNumbers(lowest: number, highest: number): WavelengthUnit | null {
  for (const { unit, low, high } of READINGS) if (lowest >= low && highest <= high) return unit;
  return null;
}

/**
 * Whether a sequence can be a wavelength axis: finite, strictly rising or strictly falling.
 *
 * @param values at least two numbers
 */
export function isMonotonic(values: Float64Array): boolean {
  if (values.length < 2) return false;
  const sign = Math.sign(values[1]! - values[0]!);
  if (sign === 0) return false;
  for (let i = 1; i < values.length; i += 1) if (!((values[i]! - values[i - 1]!) * sign > 0)) return false;
  return true;
}

/**
 * Turn numbers of an axis into ångström, in place.
 *
 * @param values as read
 * @param unit what they mean
 */
export function toAngstrom(values: Float64Array, unit: WavelengthUnit): Float64Array {
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    const length = unit.meaning === 'log10' ? 10 ** value : unit.meaning === 'ln' ? Math.exp(value) : value;
    values[i] = length * unit.angstrom;
  }
  return values;
}
