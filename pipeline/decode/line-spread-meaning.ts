import { median } from '../core/quantile.ts';
import { parseWavelengthUnit } from './wavelength/wavelength-unit.ts';
import type { ArmLayout } from './layout.ts';

type LineSpreadMeaning = ArmLayout['lineSpreadMeaning'];

/** A line spread is sampled by 0.3 to 10 pixels (sigma); R of survey spectrographs lies in 100 to 200,000. */
const PIXEL_RANGE = [0.3, 10] as const;
const RESOLVING_POWER_RANGE = [100, 200_000] as const;

/**
 * What the numbers of a line-spread array mean, by unit, else by name and size.
 *
 * @param name column name or EXTNAME
 * @param unit as written, may be empty
 * @param values a sample of the array
 * @returns null when it cannot be told; the array is then left out
 */
export function lineSpreadMeaningOf(
  name: string,
  unit: string,
  values: Float64Array,
): LineSpreadMeaning | null {
  const isWidthAtHalf = /fwhm/i.test(name);
  const plainUnit = unit.trim().toLowerCase();
  if (/^pix(el)?s?$/.test(plainUnit)) return isWidthAtHalf ? 'fwhm-pixel' : 'sigma-pixel';
  if (/km/.test(plainUnit)) return isWidthAtHalf ? null : 'sigma-km-s';
  if (parseWavelengthUnit(plainUnit)?.angstrom === 1)
    return isWidthAtHalf ? 'fwhm-angstrom' : 'sigma-angstrom';
  if (plainUnit !== '') return null;
  const typical = median(values.filter((value) => value > 0));
  if (/resol/i.test(name) && within(typical, RESOLVING_POWER_RANGE)) return 'resolving-power';
  if (!within(typical, PIXEL_RANGE)) return null;
  return isWidthAtHalf ? 'fwhm-pixel' : 'sigma-pixel';
}

function within(value: number, [low, high]: readonly [number, number]): boolean {
  return value >= low && value <= high;
}
