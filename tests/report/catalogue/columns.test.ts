import { describe, expect, it } from 'vitest';
import { cellOf } from '../../../report/catalogue/cell.ts';
import { COLUMNS } from '../../../report/catalogue/columns.ts';
import type { Column } from '../../../report/catalogue/columns.ts';
import { inCatalogueOrder } from '../../../report/catalogue/row-order.ts';
import { emptyRow } from '../fabricated-night.ts';

const column = (name: Column['name']): Column => COLUMNS.find((one) => one.name === name)!;

describe('COLUMNS', () => {
  it('are the columns of a row, each once, in the order of the row', () => {
    expect(COLUMNS.map(({ name }) => name)).toEqual(Object.keys(emptyRow('a')));
  });

  it('have names that FITS readers may match without regard to case', () => {
    expect(new Set(COLUMNS.map(({ name }) => name.toUpperCase())).size).toBe(COLUMNS.length);
    for (const { name } of COLUMNS) expect(name).toMatch(/^[a-z][a-z0-9_]*$/);
  });

  it('are explained in printable ASCII, which FITS needs', () => {
    for (const { meaning } of COLUMNS) expect(meaning).toMatch(/^[ -~]{5,}$/);
  });
});

describe('cellOf()', () => {
  it('rounds float columns to 32 bits and leaves double columns alone', () => {
    const row = { ...emptyRow('a'), confidence: 0.1, redshift: 0.1 };
    expect(cellOf(row, column('confidence'))).toBe(Math.fround(0.1));
    expect(cellOf(row, column('redshift'))).toBe(0.1);
  });

  it('makes what is not finite missing, also what overflows 32 bits', () => {
    const row = { ...emptyRow('a'), redshift: NaN, chi_square: 1e39, lines_detected: Infinity };
    expect(cellOf(row, column('redshift'))).toBeNull();
    expect(cellOf(row, column('chi_square'))).toBeNull();
    expect(cellOf(row, column('lines_detected'))).toBeNull();
  });

  it('refuses a value of another type, and an integer that is none', () => {
    const wrong = { ...emptyRow('a'), redshift: '0.1' as unknown as number, fibre: 1.5 };
    expect(() => cellOf(wrong, column('redshift'))).toThrow(TypeError);
    expect(() => cellOf(wrong, column('fibre'))).toThrow(TypeError);
  });
});

describe('inCatalogueOrder()', () => {
  it('sorts by code units, not by any alphabet, and does not touch its argument', () => {
    const rows = ['b', 'Z', 'é', 'a', 'B', 'a/10', 'a/9'].map(emptyRow);
    const before = rows.map((row) => row.spectrum_id);
    expect(inCatalogueOrder(rows).map((row) => row.spectrum_id)).toEqual([
      'B',
      'Z',
      'a',
      'a/10',
      'a/9',
      'b',
      'é',
    ]);
    expect(rows.map((row) => row.spectrum_id)).toEqual(before);
  });
});
