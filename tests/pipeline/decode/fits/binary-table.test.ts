import { describe, expect, it } from 'vitest';
import { bytesInMemory } from '../../../../pipeline/decode/byte-source.ts';
import type { TableHdu } from '../../../../pipeline/decode/fits/index.ts';
import { faultOf } from '../../../support/fault-of.ts';
import { bigEndian, joined, latin1, open, tableAt, tableFile } from './hand-made.ts';

function table(
  rowBytes: number,
  rowCount: number,
  forms: readonly string[],
  data: Uint8Array,
  ...more: string[]
): TableHdu {
  return tableAt(open(tableFile(rowBytes, rowCount, forms, data, more)), 1);
}

describe('TableHdu, numbers', () => {
  it('reads a column out of the middle of each row', () => {
    const row = (i: number): Uint8Array =>
      joined(bigEndian('Int16', [i]), bigEndian('Float64', [i / 8, -i]), bigEndian('Int32', [1000 * i]));
    const made = table(22, 5, ['I', '2D', '1J'], joined(...[0, 1, 2, 3, 4].map(row)));
    expect([...made.readNumbers(1, 2, 2)]).toEqual([0.25, -2, 0.375, -3]);
    expect([...made.readNumbers(2, 0, 5)]).toEqual([0, 1000, 2000, 3000, 4000]);
    expect([...made.readCell(1, 4)]).toEqual([0.5, -4]);
  });

  it('keeps unsigned and 64-bit integers exact', () => {
    const data = joined(bigEndian('Int32', [-1]), bigEndian('BigInt64', [2n ** 53n + 1n, -1n]));
    const made = table(20, 1, ['J', 'K', 'K'], data, 'TZERO1  = 2147483648', 'TZERO3  = 9223372036854775808');
    expect(made.readIntegers(0, 0, 1)).toEqual([2147483647n]);
    expect(made.readIntegers(1, 0, 1)).toEqual([9007199254740993n]);
    expect(made.readStrings(1, 0, 1)).toEqual(['9007199254740993']);
    expect(made.readIntegers(2, 0, 1)).toEqual([2n ** 63n - 1n]);
  });

  it('makes TNULL NaN, null and empty text, compared before scaling', () => {
    const made = table(2, 3, ['I'], bigEndian('Int16', [-99, 0, 7]), 'TNULL1  = -99', 'TZERO1  = 99');
    expect([...made.readNumbers(0, 0, 3)]).toEqual([NaN, 99, 106]);
    expect(made.readIntegers(0, 0, 3)).toEqual([null, 99n, 106n]);
    expect(made.readStrings(0, 0, 3)).toEqual(['', '99', '106']);
  });

  it('scales floats and the real part of complex numbers', () => {
    const data = bigEndian('Float32', [1, 2, 3]);
    const made = table(
      12,
      1,
      ['E', 'C'],
      data,
      'TSCAL1  = 2',
      'TZERO1  = 0.5',
      'TSCAL2  = 10',
      'TZERO2  = 1',
    );
    expect([...made.readNumbers(0, 0, 1)]).toEqual([2.5]);
    expect([...made.readNumbers(1, 0, 1)]).toEqual([21, 30]);
  });

  it('refuses exact integers of a scaled column, and numbers of a text column', () => {
    const made = table(4, 1, ['I', '2A'], new Uint8Array(4), 'TSCAL1  = 0.5');
    expect(faultOf(() => made.readIntegers(0, 0, 1)).code).toBe('value-not-usable');
    expect(() => made.readNumbers(1, 0, 1)).toThrow(TypeError);
    expect(() => made.readLogicals(0, 0, 1)).toThrow(TypeError);
    expect(() => made.readNumbers(2, 0, 1)).toThrow(RangeError);
  });

  it('writes single-precision numbers as text with the digits they carry', () => {
    const made = table(4, 3, ['E'], bigEndian('Float32', [0.1, 16777216, NaN]));
    expect(made.readStrings(0, 0, 3)).toEqual(['0.1', '16777216', '']);
  });
});

describe('TableHdu, other types', () => {
  it('cuts text at trailing blanks and at NUL', () => {
    const made = table(6, 3, ['6A'], latin1('ab    a\u0000cdef      '));
    expect(made.readStrings(0, 0, 3)).toEqual(['ab', 'a', '']);
  });

  it('reads logicals as true, false and undefined', () => {
    const made = table(1, 3, ['L'], latin1('TF\u0000'));
    expect(made.readLogicals(0, 0, 3)).toEqual([true, false, null]);
    expect(made.readStrings(0, 0, 3)).toEqual(['true', 'false', '']);
    expect([...made.readNumbers(0, 0, 3)]).toEqual([1, 0, NaN]);
  });

  it('reads bits from the most significant down, without the filling ones', () => {
    const made = table(2, 2, ['11X'], Uint8Array.of(0xa0, 0x3f, 0x01, 0xe0));
    expect(made.readBits(0, 0, 2)).toEqual(['10100000001', '00000001111']);
  });

  it('describes columns by name, unit, UCD, shape and type', () => {
    const more = ["TUNIT1  = 'km/s'", "TUCD1   = 'phys.veloc'", "TDIM1   = '(3,2)'"];
    const made = table(48, 1, ['6D'], new Uint8Array(48), ...more);
    expect(made.columns).toEqual([
      { name: 'c1', unit: 'km/s', ucd: 'phys.veloc', code: 'D', repeat: 6, shape: [3, 2] },
    ]);
  });

  it('passes over a TDIM that does not fit its cell', () => {
    expect(table(16, 1, ['2D'], new Uint8Array(16), "TDIM1   = '(3,2)'").columns[0]?.shape).toEqual([2]);
  });

  it('has columns of zero width and tables of zero rows', () => {
    const made = table(2, 2, ['0D', 'I'], bigEndian('Int16', [3, 4]));
    expect(made.readNumbers(0, 0, 2)).toHaveLength(0);
    expect([...made.readNumbers(1, 0, 2)]).toEqual([3, 4]);
    const empty = table(8, 0, ['D'], new Uint8Array(0));
    expect([empty.rowCount, empty.readNumbers(0, 0, 0).length]).toEqual([0, 0]);
    expect(faultOf(() => empty.readNumbers(0, 0, 1)).code).toBe('row-missing');
  });
});

describe('TableHdu, variable-length columns', () => {
  it('follows P and Q descriptors past THEAP', () => {
    const rows = joined(
      bigEndian('Int32', [2, 4]),
      bigEndian('BigInt64', [1n, 8n]),
      bigEndian('Int32', [0, 0]),
    );
    const data = joined(
      rows,
      bigEndian('BigInt64', [0n, 0n]),
      new Uint8Array(4),
      bigEndian('Int16', [0, 0, 7, 8, 9, 0]),
    );
    const made = table(24, 2, ['1PI(2)', '1QI(1)'], data, 'THEAP   = 52', 'TZERO1  = 100');
    expect([...made.readCell(0, 0)]).toEqual([107, 108]);
    expect([...made.readCell(1, 0)]).toEqual([9]);
    expect(made.readCell(0, 1)).toHaveLength(0);
    expect(made.columns[0]).toMatchObject({ code: 'P', repeat: 2, elementCode: 'I' });
  });

  it('reads variable-length text', () => {
    const made = table(8, 2, ['PA(5)'], joined(bigEndian('Int32', [5, 0, 2, 5]), latin1('helloyo')));
    expect(made.readStrings(0, 0, 2)).toEqual(['hello', 'yo']);
  });

  it.each([
    ['past the end of the heap', [3, 0]],
    ['before its start', [1, -2]],
    ['of negative length', [-1, 0]],
  ])('says value-not-usable for an array %s', (_, descriptor) => {
    const made = table(8, 1, ['PI(3)'], joined(bigEndian('Int32', descriptor), bigEndian('Int16', [1, 2])));
    const fault = faultOf(() => made.readCell(0, 0));
    expect([fault.code, fault.place.row]).toEqual(['value-not-usable', 0]);
  });
});

describe('TableHdu, how it reads', () => {
  const WIDE = 40_000;
  const bytes = tableFile(
    WIDE + 4,
    50,
    [`${WIDE}B`, 'J'],
    joined(
      ...Array.from({ length: 50 }, (_, i) => joined(new Uint8Array(WIDE).fill(i), bigEndian('Int32', [i]))),
    ),
  );

  it('leaves the wide columns of a row unread when a narrow one is asked for', () => {
    let read = 0;
    const memory = bytesInMemory('made.fits', bytes);
    const file = open({
      ...memory,
      read: (offset, length) => {
        read += length;
        return memory.read(offset, length);
      },
    });
    read = 0;
    expect([...tableAt(file, 1).readNumbers(1, 10, 3)]).toEqual([10, 11, 12]);
    expect(read).toBe(3 * 4);
  });

  it('gives the same numbers in one go, in pieces and cell by cell', () => {
    // 9 MB of rows: more than two of the pieces in which whole rows are read.
    const rows = 700_000;
    const values = Array.from({ length: rows }, (_, i) => i);
    const packed = new Uint8Array(13 * rows);
    const view = new DataView(packed.buffer);
    for (const i of values) view.setFloat64(13 * i + 5, i);
    const made = table(13, rows, ['5A', 'D'], packed);
    const all = made.readNumbers(1, 0, rows);
    expect(all.every((value, i) => value === i)).toBe(true);
    for (const row of [0, 322_637, 322_638, 322_639, rows - 1]) {
      expect(made.readCell(1, row)[0]).toBe(row);
    }
    expect([...made.readNumbers(1, 322_630, 20)]).toEqual(values.slice(322_630, 322_650));
  });
});
