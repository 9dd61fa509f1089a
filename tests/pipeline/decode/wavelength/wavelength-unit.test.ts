import { describe, expect, it } from 'vitest';
import {
  isMonotonic,
  wavelengthUnitByNumbers,
} from '../../../../pipeline/decode/wavelength/wavelength-numbers.ts';
import { parseWavelengthUnit } from '../../../../pipeline/decode/wavelength/wavelength-unit.ts';

describe('parseWavelengthUnit', () => {
  it.each([
    ['Angstrom', 1, 'linear'],
    ['Angstroms', 1, 'linear'],
    ['AA', 1, 'linear'],
    ['Å', 1, 'linear'],
    ['nm', 10, 'linear'],
    ['um', 1e4, 'linear'],
    ['micron', 1e4, 'linear'],
    ['m', 1e10, 'linear'],
    ['log10(Angstrom)', 1, 'log10'],
    ['log Angstrom', 1, 'log10'],
    ['dex(nm)', 10, 'log10'],
    ['ln Angstrom', 1, 'ln'],
  ])('reads %s', (text, angstrom, meaning) => {
    expect(parseWavelengthUnit(text)).toEqual({ angstrom, meaning });
  });

  it.each(['', 'erg', 'km/s', 'pixel'])("takes '%s' for no length", (text) => {
    expect(parseWavelengthUnit(text)).toBeNull();
  });
});

describe('wavelengthUnitByNumbers', () => {
  it.each([
    [3600, 10_400, { angstrom: 1, meaning: 'linear' }],
    [360, 880, { angstrom: 10, meaning: 'linear' }],
    [0.36, 1.04, { angstrom: 1e4, meaning: 'linear' }],
    [3.6e-7, 1.04e-6, { angstrom: 1e10, meaning: 'linear' }],
    [3.55, 4.02, { angstrom: 1, meaning: 'log10' }],
    [8.18, 9.25, { angstrom: 1, meaning: 'ln' }],
  ])('knows what %d to %d must be', (low, high, expected) => {
    expect(wavelengthUnitByNumbers(low, high)).toEqual(expected);
  });

  it('does not guess outside optical light', () => {
    expect(wavelengthUnitByNumbers(0, 4000)).toBeNull();
    expect(wavelengthUnitByNumbers(50, 200)).toBeNull();
  });
});

describe('isMonotonic', () => {
  it('accepts rising and falling axes, refuses steps of zero, turns and holes', () => {
    expect(isMonotonic(Float64Array.of(1, 2, 4))).toBe(true);
    expect(isMonotonic(Float64Array.of(4, 2, 1))).toBe(true);
    for (const bad of [[1, 1, 2], [1, 2, 1], [1, NaN, 3], [1]])
      expect(isMonotonic(Float64Array.from(bad))).toBe(false);
  });
});
