import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { bytesInMemory, DEFAULT_READ_LIMITS } from '../../../../pipeline/decode/index.ts';
import { type FitsFile, type Header, readFits } from '../../../../pipeline/decode/fits/index.ts';
import { spectralAxisOf } from '../../../../pipeline/decode/wavelength/spectral-axis-of.ts';
import { encodeFits } from '../../../../pipeline/encode/index.ts';
import { faultOf } from '../../../support/fault-of.ts';
import { printSkipReason, sharedPath } from '../../../support/shared-data.ts';

const PLACE = { file: 'made.fits', hdu: 0 };
/** Files written by astropy 5.2.1; expected.json holds what wcslib 7.12 makes of their axes. */
const folder = sharedPath('design', 'checks', 'fits');
if (folder === null) printSkipReason('the folder of FITS check files');

function fileOf(bytes: Uint8Array): FitsFile {
  return readFits(bytesInMemory('made.fits', bytes), DEFAULT_READ_LIMITS);
}

/** The file's first header with some cards changed. */
function withCards(header: Header, changes: Readonly<Record<string, number | string>>): Header {
  return { ...header, keys: () => header.keys(), get: (keyword) => changes[keyword] ?? header.get(keyword) };
}

interface Expected {
  readonly [file: string]: Readonly<Record<string, readonly number[]>>;
}

describe.skipIf(folder === null)('spectralAxisOf() on files written by astropy', () => {
  const read = (name: string): FitsFile => fileOf(new Uint8Array(readFileSync(join(folder!, name))));
  const expected = (): Expected =>
    JSON.parse(readFileSync(join(folder!, 'expected.json'), 'utf8')) as Expected;

  it('gives a tabulated axis at whole and half pixels', () => {
    const file = read('wavetab.fits');
    const { header } = file.hdus[0]!;
    const { pix, lambda_A: lambda } = expected()['wavetab.fits']!;
    pix!.forEach((pixel, k) => {
      // Pixel 1 of an axis whose reference value is the wanted place in the table.
      const axis = spectralAxisOf(file, withCards(header, { CRVAL1: pixel }), 1, 1, PLACE);
      expect(axis!.wavelengthAngstrom[0]).toBeCloseTo(lambda![k]!, 9);
    });
    const whole = spectralAxisOf(file, header, 1, 5, PLACE)!;
    expect([...whole.wavelengthAngstrom]).toEqual([4000, 4002, 4005, 4009, 4014]);
    expect(whole.medium).toBe('vacuum');
  });

  it.each([
    ['wavelog_image.fits', 'lambda_pix1_2_50', [1, 2, 50]],
    ['dcflag1_log10.fits', 'lambda_1_2_20', [1, 2, 20]],
  ] as const)('gives the axis of %s within 1e-12', (name, key, pixels) => {
    const file = read(name);
    const axis = spectralAxisOf(file, file.hdus[0]!.header, 1, 50, PLACE)!;
    pixels.forEach((pixel, k) => {
      const wanted = expected()[name]![key]![k]!;
      expect(Math.abs(axis.wavelengthAngstrom[pixel - 1]! / wanted - 1)).toBeLessThan(1e-12);
    });
  });
});

describe('spectralAxisOf()', () => {
  function tabulated(cards: Readonly<Record<string, number | string>>, coordinates: number[]): FitsFile {
    const all = {
      CTYPE1: 'AWAV-TAB',
      CUNIT1: 'nm',
      CRPIX1: 1,
      CRVAL1: 1,
      CDELT1: 1,
      PS1_0: 'AXES',
      PS1_1: 'WAVE',
      ...cards,
    };
    return fileOf(
      encodeFits([
        {
          type: 'image',
          axes: [4],
          pixels: Float32Array.of(1, 2, 3, 4),
          cards: Object.entries(all).map(([keyword, value]) => ({ keyword, value })),
        },
        {
          type: 'table',
          name: 'AXES',
          rowCount: 1,
          columns: [
            { name: 'WAVE', type: 'float64', repeat: coordinates.length, values: coordinates },
            { name: 'PLACE', type: 'float64', repeat: 3, values: [0, 10, 30] },
          ],
        },
      ]),
    );
  }
  const axisOf = (file: FitsFile) => spectralAxisOf(file, file.hdus[0]!.header, 1, 4, PLACE);

  it('reads air wavelengths in the unit of the axis', () => {
    const axis = axisOf(tabulated({}, [400, 401, 403, 406]))!;
    expect([...axis.wavelengthAngstrom]).toEqual([4000, 4010, 4030, 4060]);
    expect(axis.medium).toBe('air');
  });

  it('goes through the index vector when there is one', () => {
    // ψ = 0, 10, 20, 30 stands at places 1, 2, 2.5, 3 of the vector (0, 10, 30).
    const axis = axisOf(tabulated({ PS1_2: 'PLACE', CRVAL1: 0, CDELT1: 10 }, [400, 500, 700]))!;
    expect([...axis.wavelengthAngstrom]).toEqual([4000, 5000, 6000, 7000]);
  });

  it.each([
    ['a table that is not there', { PS1_0: 'ELSEWHERE' }],
    ['a column that is not there', { PS1_1: 'NOTHING' }],
    ['an index column that is not there', { PS1_2: 'NOTHING' }],
    ['a table too short for the pixels', { CRVAL1: 3 }],
  ])('refuses %s', (_what, cards) => {
    expect(faultOf(() => axisOf(tabulated(cards, [400, 401, 403, 406]))).code).toBe('wavelength-missing');
  });
});
