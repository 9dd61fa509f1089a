import { describe, expect, it } from 'vitest';
import type { CardValue } from '../../../../pipeline/decode/fits/index.ts';
import { spectralAxisFromHeader } from '../../../../pipeline/decode/wavelength/spectral-axis.ts';
import { faultOf } from '../../../support/fault-of.ts';
import { headerOf } from '../in-memory-file.ts';

const PLACE = { file: 'made.fits', hdu: 0 };
type Cards = Readonly<Record<string, CardValue>>;

function axis(cards: Cards, pixels = 4000) {
  return spectralAxisFromHeader(headerOf(cards), 1, pixels, PLACE);
}

/** Header, then ångström at pixels 1, 2000 and 4000 by WCSLIB 7.12 through astropy 5.2.1. */
const CASES: readonly (readonly [string, Cards, readonly number[]])[] = [
  [
    'WAVE in ångström',
    { CTYPE1: 'WAVE', CUNIT1: 'Angstrom', CRVAL1: 5000, CRPIX1: 1000.5, CDELT1: 1.25 },
    [3750.625, 6249.375, 8749.375],
  ],
  [
    'AWAV in metres by default',
    { CTYPE1: 'AWAV', CRVAL1: 5e-7, CRPIX1: 1, CDELT1: 1e-10 },
    [5000, 6999, 8999],
  ],
  [
    'WAVE-LOG',
    { CTYPE1: 'WAVE-LOG', CUNIT1: 'Angstrom', CRVAL1: 3650, CRPIX1: 1, CDELT1: 0.84 },
    [3650, 5782.123502622647, 9161.82116270322],
  ],
  [
    'WAVE-F2W',
    { CTYPE1: 'WAVE-F2W', CUNIT1: 'Angstrom', CRVAL1: 6000, CRPIX1: 2000, CDELT1: 1.1 },
    [4390.8329166107646, 6000, 9473.684210526316],
  ],
  [
    'WAVE in nm with CD1_1',
    { CTYPE1: 'WAVE', CUNIT1: 'nm', CRVAL1: 365, CRPIX1: 1, CD1_1: 0.09 },
    [3650, 5449.1, 7249.1],
  ],
  [
    'FREQ',
    { CTYPE1: 'FREQ', CUNIT1: 'Hz', CRVAL1: 6e14, CRPIX1: 2000, CDELT1: -5e10 },
    [699950000000000, 6e14, 5e14].map((hertz) => 2.99792458e18 / hertz),
  ],
  [
    'FREQ-LOG',
    { CTYPE1: 'FREQ-LOG', CUNIT1: 'Hz', CRVAL1: 6e14, CRPIX1: 2000, CDELT1: -5e10 },
    [708757182159843.5, 6e14, 507889034934368.5].map((hertz) => 2.99792458e18 / hertz),
  ],
];

describe('spectralAxisFromHeader', () => {
  it.each(CASES)('reads %s as WCSLIB does, within 1e-6 Å', (_, cards, expected) => {
    const { wavelengthAngstrom } = axis(cards)!;
    [0, 1999, 3999].forEach((pixel, i) => {
      expect(Math.abs(wavelengthAngstrom[pixel]! - expected[i]!)).toBeLessThan(1e-6);
    });
  });

  it('takes WAVE and FREQ as vacuum, AWAV as air, and LINEAR as not saying', () => {
    const base = { CRVAL1: 5000, CRPIX1: 1, CDELT1: 1, CUNIT1: 'Angstrom' };
    expect(axis({ ...base, CTYPE1: 'WAVE' })?.medium).toBe('vacuum');
    expect(axis({ ...base, CTYPE1: 'AWAV' })?.medium).toBe('air');
    expect(axis({ ...base, CTYPE1: 'LINEAR' })?.medium).toBeNull();
  });

  it.each([
    [
      'CRVAL1 and CD1_1 under a log flag',
      { CTYPE1: 'LINEAR', CRVAL1: 3.5682, CRPIX1: 1, CD1_1: 1e-4, 'DC-FLAG': 1 },
    ],
    ['COEFF0 and COEFF1', { COEFF0: 3.5682, COEFF1: 1e-4 }],
    ['log10 values under the name WAVE-LOG', { CTYPE1: 'WAVE-LOG', CRVAL1: 3.5682, CRPIX1: 1, CDELT1: 1e-4 }],
  ])('reads %s as log10 of ångström and says so', (_, cards) => {
    const found = axis(cards, 3001)!;
    expect(found.wavelengthAngstrom[0]).toBeCloseTo(10 ** 3.5682, 8);
    expect(found.wavelengthAngstrom[3000]).toBeCloseTo(10 ** 3.8682, 8);
    expect(found.recognised).toContain('log10');
  });

  it('takes ångström when the unit is left out and the numbers can be nothing else', () => {
    expect(axis({ CRVAL1: 4000, CDELT1: 2 }, 1000)?.wavelengthAngstrom[999]).toBe(5998);
  });

  it('finds no axis where the header has none, or one of another kind', () => {
    expect(axis({})).toBeNull();
    expect(axis({ CTYPE1: 'RA---TAN', CRVAL1: 12, CDELT1: 0.1, CRPIX1: 1 })).toBeNull();
  });

  it('refuses units that are no length and axes that need a table', () => {
    const base = { CRVAL1: 5000, CRPIX1: 1, CDELT1: 1 };
    expect(faultOf(() => axis({ ...base, CTYPE1: 'WAVE', CUNIT1: 'furlong' })).code).toBe('unit-unknown');
    expect(faultOf(() => axis({ ...base, CTYPE1: 'FREQ', CUNIT1: 'Angstrom' })).code).toBe('unit-unknown');
    expect(faultOf(() => axis({ ...base, CTYPE1: 'WAVE-TAB' })).code).toBe('fits-unsupported');
  });
});
