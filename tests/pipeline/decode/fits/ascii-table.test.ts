import { describe, expect, it } from 'vitest';
import { hasOutsideTool, outputOf, PYTHON } from '../../../support/outside-tool.ts';
import { faultOf } from '../../../support/fault-of.ts';
import { EMPTY_PRIMARY, header, joined, latin1, open, otherAt, padded, tableAt } from './hand-made.ts';

function asciiTable(rows: readonly string[], fields: readonly string[]): Uint8Array {
  const head = header(
    "XTENSION= 'TABLE   '",
    'BITPIX  = 8',
    'NAXIS   = 2',
    `NAXIS1  = ${rows[0]!.length}`,
    `NAXIS2  = ${rows.length}`,
    'PCOUNT  = 0',
    'GCOUNT  = 1',
    ...fields,
  );
  return joined(EMPTY_PRIMARY, head, padded(latin1(rows.join('')), 0x20));
}

const ROWS = [
  ' 1.25E+01  9007199254740993 ab  ',
  '    -.5D0                -7  cd ',
  '                       -999     ',
];
const FIELDS = [
  'TFIELDS = 3',
  "TTYPE1  = 'real'",
  'TBCOL1  = 1',
  "TFORM1  = 'D9.2'",
  "TUNIT1  = 'km/s'",
  "TTYPE2  = 'whole'",
  'TBCOL2  = 11',
  "TFORM2  = 'I17'",
  "TNULL2  = '-999'",
  "TTYPE3  = 'text'",
  'TBCOL3  = 29',
  "TFORM3  = 'A4'",
];

describe('an ASCII table', () => {
  const table = tableAt(open(asciiTable(ROWS, FIELDS)), 1);

  it('gives numbers, exact integers and text; blank and TNULL fields are missing', () => {
    expect(table.columns.map((column) => [column.name, column.code, column.unit])).toEqual([
      ['real', 'D', 'km/s'],
      ['whole', 'K', ''],
      ['text', 'A', ''],
    ]);
    expect([...table.readNumbers(0, 0, 3)]).toEqual([12.5, -0.5, NaN]);
    expect(table.readIntegers(1, 0, 3)).toEqual([9007199254740993n, -7n, null]);
    expect(table.readStrings(1, 1, 2)).toEqual(['-7', '']);
    expect(table.readStrings(2, 0, 3)).toEqual(['ab', ' cd', '']);
  });

  it('puts the point where TFORM says when a field has none', () => {
    const implied = asciiTable(
      ['  125'],
      ['TFIELDS = 1', 'TBCOL1  = 1', "TFORM1  = 'F5.2'", 'TZERO1  = 100'],
    );
    expect([...tableAt(open(implied), 1).readNumbers(0, 0, 1)]).toEqual([101.25]);
  });

  it('names the row of a field that is no number', () => {
    const bad = asciiTable(['  1', ' x '], ['TFIELDS = 1', 'TBCOL1  = 1', "TFORM1  = 'I3'"]);
    const fault = faultOf(() => tableAt(open(bad), 1).readNumbers(0, 0, 2));
    expect([fault.code, fault.place.row]).toEqual(['value-not-usable', 1]);
  });

  it('is of type other when a field does not fit the row', () => {
    const wide = asciiTable(['abc'], ['TFIELDS = 1', 'TBCOL1  = 2', "TFORM1  = 'A3'"]);
    expect(otherAt(open(wide), 1).reason).toMatch(/^fits-bad-header: .*TBCOL1/);
  });
});

const SCRIPT = `
import io, base64
from astropy.io import fits
made = fits.TableHDU.from_columns([
    fits.Column('x', 'E15.7', array=[1.5, -2.25e10]), fits.Column('n', 'I10', array=[3, -4]),
    fits.Column('s', 'A5', array=['ab', 'cde'])])
out = io.BytesIO()
fits.HDUList([fits.PrimaryHDU(), made]).writeto(out)
print(base64.b64encode(out.getvalue()).decode())
`;

describe.skipIf(!hasOutsideTool(PYTHON, ['-c', 'import astropy.io.fits'], 'python3-astropy'))(
  'an ASCII table that astropy wrote',
  () => {
    it('reads back to the values it was made of', () => {
      const bytes = Uint8Array.from(Buffer.from(outputOf(PYTHON, ['-c', SCRIPT]), 'base64'));
      const table = tableAt(open(bytes), 1);
      expect([...table.readNumbers(0, 0, 2)]).toEqual([1.5, -2.25e10]);
      expect(table.readIntegers(1, 0, 2)).toEqual([3n, -4n]);
      expect(table.readStrings(2, 0, 2)).toEqual(['ab', 'cde']);
    });
  },
);
