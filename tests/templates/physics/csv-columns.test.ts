import { describe, expect, it } from 'vitest';
import { numberColumn, parseCsv, textColumn } from '../../../templates/physics/csv-columns.ts';

describe('parseCsv', () => {
  const table = parseCsv('# a remark\nname,value\nfirst,1\n\nsecond,\n');

  it('leaves out remarks and empty lines, and reads an empty cell as NaN', () => {
    expect(textColumn(table, 'name')).toEqual(['first', 'second']);
    expect([...numberColumn(table, 'value')]).toEqual([1, NaN]);
  });

  it('refuses a row of another length, an unknown column and a word among numbers', () => {
    expect(() => parseCsv('a,b\n1\n')).toThrow(RangeError);
    expect(() => numberColumn(table, 'absent')).toThrow(RangeError);
    expect(() => numberColumn(table, 'name')).toThrow(RangeError);
  });
});
