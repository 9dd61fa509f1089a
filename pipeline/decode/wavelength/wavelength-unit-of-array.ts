import { InputFault } from '../../errors.ts';
import type { FaultPlace } from '../../errors.ts';
import { wavelengthUnitByNumbers } from './wavelength-numbers.ts';
import { parseWavelengthUnit } from './wavelength-unit.ts';
import type { WavelengthUnit } from './wavelength-unit.ts';

/**
 * Unit of a wavelength array: by its numbers where those can mean one thing only, else by the unit text. The
 * numbers come first because a column of log10 values is often labelled plainly `Angstrom`.
 *
 * @param name for messages
 * @param unitText as written, may be empty
 * @param values the array; padding (0, NaN) is left out
 * @throws InputFault `unit-unknown` when neither tells
 */
export function wavelengthUnitOfArray(
  name: string,
  unitText: string,
  values: Float64Array,
  place: FaultPlace,
): WavelengthUnit {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (!Number.isFinite(value) || value === 0) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  const byNumbers = wavelengthUnitByNumbers(low, high);
  const stated = parseWavelengthUnit(unitText);
  if (byNumbers !== null && (stated === null || byNumbers.meaning !== 'linear')) return byNumbers;
  if (stated !== null) return stated;
  const found = `${low} to ${high} in unit '${unitText}'`;
  throw new InputFault('unit-unknown', place, `'${name}' must be a wavelength, got ${found}`);
}
