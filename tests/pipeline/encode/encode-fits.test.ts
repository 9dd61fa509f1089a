import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bytesInMemory } from '../../../pipeline/decode/byte-source.ts';
import type { FitsFile, TableHdu } from '../../../pipeline/decode/fits/index.ts';
import { DEFAULT_READ_LIMITS, readFits } from '../../../pipeline/decode/fits/index.ts';
import { onesComplementSum } from '../../../pipeline/encode/checksum.ts';
import type { ColumnSpec, HduSpec, Pixels } from '../../../pipeline/encode/index.ts';
import { asciiText, encodeFits, encodeFitsChunks } from '../../../pipeline/encode/index.ts';

const SEED = 20310402;
console.info(`encode-fits properties: fast-check seed ${SEED}`);
const RUNS = { seed: SEED, numRuns: 100 };

function reread(hdus: readonly HduSpec[]): FitsFile {
  const file = readFits(bytesInMemory('written.fits', encodeFits(hdus)), DEFAULT_READ_LIMITS);
  expect(file.fault).toBeNull();
  expect(file.trailingBytes).toBe(0);
  return file;
}

function rereadTable(rowCount: number, columns: readonly ColumnSpec[]): TableHdu {
  const hdu = reread([{ type: 'table', rowCount, columns }]).hdus[1];
  if (hdu?.type !== 'table') throw new Error('HDU 1 must be a table');
  return hdu;
}

const printable = fc.string({
  unit: fc.integer({ min: 32, max: 126 }).map((code) => String.fromCharCode(code)),
});
/** Trailing blanks carry no meaning in FITS strings. */
const text = fc
  .oneof(printable, fc.constantFrom("'", "''", '&', "it's & that's &"))
  .map((one) => one.trimEnd());
const longText = fc.array(text, { maxLength: 40 }).map((parts) => parts.join('').trimEnd());

describe('encodeFits, read back by readFits', () => {
  it('gives back any card value', () => {
    const value = fc.oneof(
      longText,
      fc.double({ noNaN: true, noDefaultInfinity: true }).map((one) => one + 0),
      fc.maxSafeInteger(),
      fc.bigInt({ min: 2n ** 53n, max: 2n ** 64n }),
      fc.boolean(),
      fc.constant(null),
    );
    fc.assert(
      fc.property(value, printable, (one, comment) => {
        const cards = [{ keyword: 'KEY', value: one, comment }];
        const header = reread([{ type: 'image', axes: [], cards }]).hdus[0]!.header;
        expect(header.get('KEY')).toEqual(one);
      }),
      RUNS,
    );
  });

  it('gives back any image of any pixel type', () => {
    const size = { maxLength: 60 };
    const pixels: fc.Arbitrary<Pixels> = fc.oneof(
      fc.uint8Array(size),
      fc.int16Array(size),
      fc.int32Array(size),
      fc.float32Array(size),
      fc.float64Array(size),
    );
    fc.assert(
      fc.property(pixels, fc.constantFrom(1, 2, 3), (drawn, width) => {
        const rows = Math.floor(drawn.length / width);
        const used = drawn.slice(0, rows * width);
        const image: HduSpec = { type: 'image', axes: [width, rows], pixels: used };
        for (const hdu of reread([image, { ...image, name: 'AGAIN' }]).hdus) {
          if (hdu.type !== 'image') throw new Error('must be an image');
          expect([...hdu.readRows(0, rows)]).toEqual([...used]);
        }
      }),
      RUNS,
    );
  });

  it('gives back any table', () => {
    const cell = fc.record({
      logical: fc.option(fc.boolean()),
      short: fc.option(fc.integer({ min: -(2 ** 31) + 1 })),
      long: fc.option(fc.bigInt({ min: -(2n ** 63n) + 1n, max: 2n ** 63n - 1n })),
      single: fc.float(),
      double: fc.option(fc.double({ noNaN: true })),
      text: fc.option(text),
      pair: fc.tuple(fc.double(), fc.double()),
    });
    fc.assert(
      fc.property(fc.array(cell, { maxLength: 12 }), (rows) => {
        const n = rows.length;
        const table = rereadTable(n, [
          { name: 'logical', type: 'logical', values: rows.map((row) => row.logical) },
          { name: 'short', type: 'int32', values: rows.map((row) => row.short) },
          { name: 'long', type: 'int64', values: rows.map((row) => row.long) },
          { name: 'single', type: 'float32', values: rows.map((row) => row.single) },
          { name: 'double', type: 'float64', values: rows.map((row) => row.double) },
          { name: 'text', type: 'string', values: rows.map((row) => row.text) },
          { name: 'pair', type: 'float64', repeat: 2, values: rows.flatMap((row) => row.pair) },
        ]);
        expect(table.columns.map((column) => column.name).join(' ')).toBe(
          'logical short long single double text pair',
        );
        expect(table.readLogicals(0, 0, n)).toEqual(rows.map((row) => row.logical));
        expect(table.readIntegers(1, 0, n)).toEqual(
          rows.map((row) => (row.short === null ? null : BigInt(row.short))),
        );
        expect(table.readIntegers(2, 0, n)).toEqual(rows.map((row) => row.long));
        expect([...table.readNumbers(3, 0, n)]).toEqual(rows.map((row) => row.single));
        expect([...table.readNumbers(4, 0, n)]).toEqual(rows.map((row) => row.double ?? NaN));
        expect(table.readStrings(5, 0, n)).toEqual(rows.map((row) => row.text ?? ''));
        expect([...table.readNumbers(6, 0, n)]).toEqual(rows.flatMap((row) => row.pair));
      }),
      RUNS,
    );
  });

  it('makes the sum of every HDU all ones, which is what a checksum promises', () => {
    // FITS 4.0, section 4.4.2.7.
    const chunks = [
      ...encodeFitsChunks([
        { type: 'image', axes: [3], pixels: new Float64Array([1, NaN, -7]) },
        { type: 'table', rowCount: 1, columns: [{ name: 'a', type: 'string', values: ['b'] }] },
      ]),
    ];
    expect(chunks).toHaveLength(4);
    for (let i = 0; i < chunks.length; i += 2) {
      expect(onesComplementSum(chunks[i + 1]!, onesComplementSum(chunks[i]!))).toBe(2 ** 32 - 1);
    }
  });
});

describe('encodeFits', () => {
  it('puts an empty primary HDU before a table, and makes one of nothing', () => {
    const types = reread([{ type: 'table', rowCount: 0, columns: [] }]).hdus.map((hdu) => hdu.type);
    expect(types).toEqual(['image', 'table']);
    expect(reread([]).hdus).toHaveLength(1);
  });

  it('writes names, units, UCDs and descriptions where the reader finds them', () => {
    const table = rereadTable(1, [
      {
        name: 'v',
        type: 'float64',
        values: [1],
        unit: 'km/s',
        ucd: 'phys.veloc',
        description: 'how fast '.repeat(20),
      },
    ]);
    expect(table.columns[0]).toMatchObject({ name: 'v', unit: 'km/s', ucd: 'phys.veloc' });
    expect(table.header.get('TCOMM1')).toBe('how fast '.repeat(20).trim());
    expect(table.header.get('LONGSTRN')).toBe('OGIP 1.0');
  });

  it('is the same in pieces as in one go', () => {
    const hdus: HduSpec[] = [
      { type: 'image', axes: [2], pixels: Int32Array.of(1, 2) },
      { type: 'image', axes: [2], pixels: Int16Array.of(3, 4) },
    ];
    const pieces = [...encodeFitsChunks(hdus)].flatMap((chunk) => [...chunk]);
    expect([...encodeFits(hdus)]).toEqual(pieces);
  });

  it.each<[string, ColumnSpec]>([
    ['too few values', { name: 'c', type: 'int32', values: [1] }],
    ['a fraction in an int32 column', { name: 'c', type: 'int32', values: [1, 0.5] }],
    ['2^31 in an int32 column', { name: 'c', type: 'int32', values: [1, 2 ** 31] }],
    ['2^63 in an int64 column', { name: 'c', type: 'int64', values: [1n, 2n ** 63n] }],
    ['a value that equals the missing one', { name: 'c', type: 'int32', values: [null, -1], missing: -1 }],
    ['text longer than the cell', { name: 'c', type: 'string', values: ['abc', ''], length: 2 }],
    ['text outside ASCII', { name: 'c', type: 'string', values: ['\u00e9', ''] }],
  ])('refuses %s', (_, column) => {
    expect(() => encodeFits([{ type: 'table', rowCount: 2, columns: [column] }])).toThrow(RangeError);
  });

  it('refuses pixels that do not fill the axes', () => {
    expect(() => encodeFits([{ type: 'image', axes: [2, 2], pixels: new Uint8Array(3) }])).toThrow(
      RangeError,
    );
  });
});

describe('asciiText', () => {
  it('takes the marks off letters and puts a question mark for what is left', () => {
    expect(asciiText('Caf\u00e9 \u00c5ngstr\u00f6m, plain')).toBe('Cafe Angstrom, plain');
    expect(asciiText('\u03b1 Cen\n')).toBe('? Cen?');
  });
});
