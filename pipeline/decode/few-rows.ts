import { median } from '../core/quantile.ts';
import { estimateInverseVariance } from './estimate-noise.ts';
import type { ImageHdu } from './fits/model.ts';
import type { ArmLayout, SpreadMeaning } from './layout.ts';
import { imageArray } from './recognition.ts';
import { spreadMeaningByNumbers } from './spread-meaning.ts';
import { isMonotonic, wavelengthUnitByNumbers } from './wavelength/wavelength-numbers.ts';
import type { WavelengthUnit } from './wavelength/wavelength-unit.ts';

/** More rows than this is a stack of spectra: no one writes a dozen arrays of one spectrum into one image. */
export const MOST_ROWS_OF_ONE_SPECTRUM = 12;
/** Bit masks have few different values; even a noisy one stays below this. */
const MOST_MASK_VALUES = 64;

/** Real errors scatter at least this much less, for their size, than the flux they belong to. */
const SMOOTHER_BY = 3;

/** What the rows of an image that holds one spectrum are. */
export interface FewRows {
  readonly flux: number;
  readonly spread: number | null;
  readonly spreadMeaning: SpreadMeaning;
  readonly wavelength: number | null;
  readonly wavelengthUnit: WavelengthUnit | null;
  readonly masks: readonly number[];
  readonly sentence: string;
}

/**
 * Decide by the numbers whether the rows of an image are the arrays of one spectrum, and which is which: a row that
 * runs one way over optical wavelengths, rows of few whole numbers, a row that explains the scatter of the first.
 *
 * @param image 2 to 12 rows
 * @returns null when the rows look alike: a small stack of spectra
 */
export function fewRowsOf(image: ImageHdu): FewRows | null {
  const rows = Array.from({ length: image.rowCount }, (_, row) => image.readRows(row, 1));
  let wavelength: number | null = null;
  let wavelengthUnit: WavelengthUnit | null = null;
  const masks: number[] = [];
  const others: number[] = [];
  for (const [row, values] of rows.entries()) {
    const unit = isMonotonic(values)
      ? wavelengthUnitByNumbers(
          Math.min(values[0]!, values[values.length - 1]!),
          Math.max(values[0]!, values[values.length - 1]!),
        )
      : null;
    if (unit !== null && wavelength === null) [wavelength, wavelengthUnit] = [row, unit];
    else if (looksLikeMask(values)) masks.push(row);
    else others.push(row);
  }
  const flux = others[0];
  if (flux === undefined) return null;
  const readings = others
    .slice(1)
    .map((row) => ({ row, reading: spreadMeaningByNumbers(rows[flux]!, rows[row]!) }))
    .filter((entry) => entry.reading !== null)
    .sort((a, b) => a.reading!.mismatch - b.reading!.mismatch);
  const best = readings[0];
  const isTold = wavelength !== null || masks.length > 0;
  if (!isTold && (best === undefined || !isSmoother(rows[best.row]!, rows[flux]!))) return null;
  const parts = [
    `row ${flux} is flux`,
    best === undefined ? '' : `row ${best.row} its ${best.reading!.meaning} (it explains the scatter)`,
    wavelength === null ? '' : `row ${String(wavelength)} wavelength (it runs one way)`,
    masks.length === 0 ? '' : `rows ${masks.join(', ')} masks (few whole numbers)`,
  ];
  return {
    flux,
    spread: best?.row ?? null,
    spreadMeaning: best?.reading?.meaning ?? 'none',
    wavelength,
    wavelengthUnit,
    masks,
    sentence: `one spectrum in an image of ${image.rowCount} rows: ${parts.filter((p) => p !== '').join(', ')}`,
  };
}

/** The layout of the one arm that `fewRowsOf` found. */
export function armOfFewRows(image: ImageHdu, found: FewRows, medium: ArmLayout['medium']): ArmLayout {
  const row = (index: number | null) => (index === null ? null : imageArray(image.index, index));
  return {
    name: '',
    wavelength: row(found.wavelength),
    wavelengthMeaning: found.wavelengthUnit?.meaning ?? 'linear',
    wavelengthUnitAngstrom: found.wavelengthUnit?.angstrom ?? 1,
    medium,
    flux: imageArray(image.index, found.flux),
    spread: row(found.spread),
    spreadMeaning: found.spreadMeaning,
    quality: found.masks.map((mask) => imageArray(image.index, mask)),
    sky: null,
    lineSpread: null,
    lineSpreadMeaning: 'sigma-pixel',
  };
}

/** Whole numbers, few different ones, mostly 0 (a constant row of another number may be a weight). */
function looksLikeMask(values: Float64Array): boolean {
  const counts = new Map<number, number>();
  for (const value of values) {
    if (!Number.isInteger(value) || value < 0) return false;
    counts.set(value, (counts.get(value) ?? 0) + 1);
    if (counts.size > MOST_MASK_VALUES) return false;
  }
  return 2 * (counts.get(0) ?? 0) > values.length;
}

/** Whether a row scatters far less, for its size, than the flux: errors do, the next spectrum of a stack does not. */
function isSmoother(row: Float64Array, flux: Float64Array): boolean {
  return SMOOTHER_BY * relativeScatter(row) < relativeScatter(flux);
}

/** Typical scatter of neighbouring pixels over the typical size; 0 for a constant. */
function relativeScatter(values: Float64Array): number {
  const all = new Uint8Array(values.length).fill(1);
  const weight = median(estimateInverseVariance(values, all));
  return weight > 0 ? 1 / (Math.sqrt(weight) * median(values.map(Math.abs))) : 0;
}
