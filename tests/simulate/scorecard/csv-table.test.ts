import { expect, it } from 'vitest';
import { numberIn, readCsv } from '../../../simulate/scorecard/csv-table.ts';

const cells = (text: string): string[][] => readCsv(text).map((row) => [...row.values()]);

it('reads quotes, doubled quotes, commas and line ends inside quotes (RFC 4180)', () => {
  expect(cells('a,b\n"x, ""y""\nz",2\n')).toEqual([['x, "y"\nz', '2']]);
});

it('passes over comments before the header, empty lines and a byte-order mark, and takes any line end', () => {
  expect(cells('\uFEFF# made by hand\r\n# twice\r\na,b\r\n1,\r\n\r\n,2')).toEqual([
    ['1', ''],
    ['', '2'],
  ]);
});

it('a row with another number of cells is refused with its line', () => {
  expect(() => readCsv('# c\na,b\n"1\n2",3\n4\n')).toThrow('line 5 must have 2 cells, got 1');
});

it('a quote that is never closed is refused', () => {
  expect(() => readCsv('a\n"1\n')).toThrow(RangeError);
});

it('an empty text has no header', () => {
  expect(() => readCsv('# only a comment\n')).toThrow('header');
});

it('a cell that is no number is missing', () => {
  const [row] = readCsv('a,b,c\n1.5e-3,,nan\n');
  expect(['a', 'b', 'c', 'd'].map((column) => numberIn(row!, column))).toEqual([0.0015, null, null, null]);
});
