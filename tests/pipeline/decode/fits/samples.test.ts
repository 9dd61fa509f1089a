import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { FitsFile, TableHdu } from '../../../../pipeline/decode/fits/index.ts';
import { printSkipReason, sharedPath } from '../../../support/shared-data.ts';
import { imageAt, open, tableAt } from './hand-made.ts';

/** Files and values written by astropy 5.2.1; expected.json holds what it reads back. */
const folder = sharedPath('design', 'checks', 'fits');
if (folder === null) printSkipReason('the folder of FITS check files');

function sample(name: string): FitsFile {
  return open(readFileSync(join(folder ?? '', name)));
}

function expected(name: string): Record<string, unknown> {
  const all = JSON.parse(readFileSync(join(folder ?? '', 'expected.json'), 'utf8')) as Record<
    string,
    unknown
  >;
  return all[name] as Record<string, unknown>;
}

function column(table: TableHdu, name: string): number {
  return table.columns.findIndex((one) => one.name === name);
}

/** JSON has no NaN: the check file writes missing values as null or "NaN". */
const orNull = (value: number): number | null => (Number.isNaN(value) ? null : value);

describe.skipIf(folder === null)('FITS check files written by astropy', () => {
  it('gives scaled and unsigned 16-bit images their physical values', () => {
    const scaled = imageAt(sample('scaled_int16.fits'), 0);
    expect(Array.from(scaled.readRows(0, 1), orNull)).toEqual(expected('scaled_int16.fits')['physical']);
    const unsigned = imageAt(sample('uint16.fits'), 0);
    expect([...unsigned.readRows(0, 1)]).toEqual(expected('uint16.fits')['physical']);
  });

  it('joins a continued string with quotes and a last ampersand, and reads a HIERARCH card', () => {
    const image = imageAt(sample('wavelog_image.fits'), 0);
    const check = expected('wavelog_image.fits');
    expect(image.header.get('LONGSTR')).toBe(check['LONGSTR']);
    expect(check['ESO']).toContain('HIERARCH ESO DET CHIP1 GAIN = 1.25');
    expect(image.header.get('ESO DET CHIP1 GAIN')).toBe(1.25);
    expect([...image.readRows(0, 1).subarray(0, 3)]).toEqual(check['first3']);
  });

  it('reads a log10-linear header and a wavelength table', () => {
    expect(imageAt(sample('dcflag1_log10.fits'), 0).header.get('CRVAL1')).toBe(3.5798);
    const table = tableAt(sample('wavetab.fits'), 1);
    expect([...table.readCell(column(table, 'LAMBDA'), 0)]).toEqual([4000, 4002, 4005, 4009, 4014]);
  });

  describe('bintable_all.fits', () => {
    const table = folder === null ? null : tableAt(sample('bintable_all.fits'), 1);
    const check = folder === null ? {} : expected('bintable_all.fits');
    const open3 = (name: string): number[] => [...table!.readNumbers(column(table!, name), 0, 3)];

    it.each(['WAVE', 'MASK', 'U32', 'SC', 'BYTE'])('reads the numbers of column %s', (name) => {
      expect(open3(name).map(orNull)).toEqual(check[name]);
    });

    it('reads NaN, vectors and complex pairs', () => {
      expect(open3('FLUX')).toEqual([1.5, NaN, -2.25]);
      expect(check['FLUX']).toEqual([1.5, 'NaN', -2.25]);
      expect(table!.columns[column(table!, 'ARR')]?.shape).toEqual([3, 2]);
      expect([...table!.readCell(column(table!, 'ARR'), 0)]).toEqual([0, 1, 2, 3, 4, 5]);
      // The file holds -0 where the check values say 0; adding 0 makes them alike.
      expect(open3('CPLX').map((value) => value + 0)).toEqual((check['CPLX'] as number[][]).flat());
    });

    it('reads 64-bit integers, logicals, bits and text', () => {
      const integers = table!.readIntegers(column(table!, 'I64'), 0, 3);
      expect(integers.map(String)).toEqual(check['I64']);
      expect(table!.readLogicals(column(table!, 'FLAG'), 0, 3)).toEqual(check['FLAG']);
      expect(table!.readBits(column(table!, 'BITS'), 0, 3)).toEqual(check['BITS']);
      expect(table!.readStrings(column(table!, 'NAME'), 0, 3)).toEqual(check['NAME']);
    });

    it.each(['VLA', 'VLQ'])('reads the arrays of variable length of column %s', (name) => {
      const cells = [0, 1, 2].map((row) => [...table!.readCell(column(table!, name), row)]);
      expect(cells).toEqual(check[name]);
    });

    it('has the row width and formats of the header', () => {
      expect(table!.header.get('NAXIS1')).toBe(check['NAXIS1']);
      expect(table!.columns.map((_, i) => table!.header.get(`TFORM${i + 1}`))).toEqual(check['TFORM']);
    });
  });
});
