import { describe, expect, it } from 'vitest';
import type { ByteSource } from '../../../../pipeline/decode/byte-source.ts';
import { faultOf } from '../../../support/fault-of.ts';
import type { Stored } from './hand-made.ts';
import {
  bigEndian,
  EMPTY_PRIMARY,
  IMAGE,
  imageAt,
  imageHeader,
  joined,
  open,
  otherAt,
  padded,
  PRIMARY,
} from './hand-made.ts';

function pixelsOf(bitpix: number, data: Uint8Array, count: number, ...more: string[]): number[] {
  return [
    ...imageAt(open(joined(imageHeader(PRIMARY, bitpix, [count], ...more), padded(data))), 0).readRows(0, 1),
  ];
}

describe('ImageHdu.readRows', () => {
  it.each<[number, Stored, readonly (number | bigint)[]]>([
    [16, 'Int16', [-32768, -1, 0, 32767]],
    [32, 'Int32', [-2147483648, -1, 0, 2147483647]],
    [64, 'BigInt64', [-9007199254740991n, -1n, 0n, 9007199254740991n]],
    [-32, 'Float32', [1.5, -0.25, 3.0e38, NaN]],
    [-64, 'Float64', [Math.PI, -1e-300, Infinity, NaN]],
  ])('decodes BITPIX %d with the most significant byte first', (bitpix, stored, values) => {
    const expected = values.map((value) =>
      stored === 'Float32' ? Math.fround(Number(value)) : Number(value),
    );
    expect(pixelsOf(bitpix, bigEndian(stored, values), values.length)).toEqual(expected);
  });

  it('decodes BITPIX 8 as unsigned, and as signed with BZERO = -128', () => {
    const stored = Uint8Array.of(0, 127, 128, 255);
    expect(pixelsOf(8, stored, 4)).toEqual([0, 127, 128, 255]);
    expect(pixelsOf(8, stored, 4, 'BZERO   = -128')).toEqual([-128, -1, 0, 127]);
  });

  it('gives unsigned 16- and 32-bit integers exactly', () => {
    expect(pixelsOf(16, bigEndian('Int16', [-32768, 0, 32767]), 3, 'BZERO   = 32768')).toEqual([
      0, 32768, 65535,
    ]);
    const words = bigEndian('Int32', [-2147483648, 0, 2147483647]);
    expect(pixelsOf(32, words, 3, 'BZERO   = 2147483648')).toEqual([0, 2147483648, 4294967295]);
  });

  it('rounds unsigned 64-bit integers once, at the end', () => {
    // 2^53 + 3 is not a double; adding 2^63 in doubles would lose the small number altogether.
    const stored = bigEndian('BigInt64', [-(2n ** 63n), 5n - 2n ** 63n, 2n ** 53n + 3n - 2n ** 63n]);
    expect(pixelsOf(64, stored, 3, 'BZERO   = 9223372036854775808')).toEqual([0, 5, 2 ** 53 + 4]);
  });

  it('applies BZERO + BSCALE · stored after BLANK, which is a stored value', () => {
    const stored = bigEndian('Int16', [-9, 100, 91]);
    const values = pixelsOf(16, stored, 3, 'BSCALE  = 1.0D-1', 'BZERO   = 100.', 'BLANK   = -9');
    expect(values).toEqual([NaN, 100 + 0.1 * 100, 100 + 0.1 * 91]);
  });

  it('marks BLANK in 64-bit images and passes over BLANK in floating point ones', () => {
    const long = bigEndian('BigInt64', [-(2n ** 63n), 1n]);
    expect(pixelsOf(64, long, 2, 'BLANK   = -9223372036854775808')).toEqual([NaN, 1]);
    expect(pixelsOf(-32, bigEndian('Float32', [-9, 1]), 2, 'BLANK   = -9')).toEqual([-9, 1]);
  });

  it('takes all axes after the first as rows', () => {
    const data = padded(
      bigEndian(
        'Int16',
        Array.from({ length: 24 }, (_, i) => i),
      ),
    );
    const image = imageAt(open(joined(imageHeader(PRIMARY, 16, [2, 3, 4]), data)), 0);
    expect(image.rowCount).toBe(12);
    expect([...image.readRows(11, 1)]).toEqual([22, 23]);
    expect([...image.readRows(3, 2)]).toEqual([6, 7, 8, 9]);
    expect(image.readRows(12, 0)).toHaveLength(0);
  });

  it('has no rows without axes or with an axis of 0', () => {
    expect(imageAt(open(EMPTY_PRIMARY), 0).rowCount).toBe(0);
    expect(imageAt(open(imageHeader(PRIMARY, 16, [3, 0])), 0).rowCount).toBe(0);
  });

  it('says row-missing beyond the last row and RangeError for what is no row at all', () => {
    const image = imageAt(
      open(joined(imageHeader(PRIMARY, 8, [2, 2]), padded(Uint8Array.of(1, 2, 3, 4)))),
      0,
    );
    const fault = faultOf(() => image.readRows(1, 2));
    expect([fault.code, fault.place.row]).toEqual(['row-missing', 2]);
    expect(() => image.readRows(-1, 1)).toThrow(RangeError);
    expect(() => image.readRows(0.5, 1)).toThrow(RangeError);
  });

  it('makes an image with an unreadable BSCALE type other', () => {
    const file = open(joined(imageHeader(PRIMARY, 8, [2], "BSCALE  = 'one'"), padded(Uint8Array.of(1, 2))));
    expect(otherAt(file, 0).reason).toMatch(/^fits-bad-header: .*BSCALE must be a number/);
  });
});

describe('a file of more than 2 GiB', () => {
  // 3 rows of 2^28 doubles are 6 GiB: all zero but for what `islands` holds.
  const WIDTH = 2 ** 28;
  const head = joined(EMPTY_PRIMARY, imageHeader(IMAGE, -64, [WIDTH, 3]));
  const dataBytes = Math.ceil((WIDTH * 3 * 8) / 2880) * 2880;
  const second = joined(imageHeader(IMAGE, 16, [4, 2]), padded(bigEndian('Int16', [1, 2, 3, 4, 5, 6, 7, 8])));
  const islands = [
    { offset: 0, bytes: head },
    { offset: head.length + dataBytes, bytes: second },
  ];
  let read = 0;
  const source: ByteSource = {
    label: 'sparse.fits',
    size: head.length + dataBytes + second.length,
    read: (offset, length) => {
      read += length;
      const out = new Uint8Array(length);
      for (const island of islands) {
        const from = Math.max(offset, island.offset);
        const to = Math.min(offset + length, island.offset + island.bytes.length);
        if (from < to) {
          out.set(island.bytes.subarray(from - island.offset, to - island.offset), from - offset);
        }
      }
      return out;
    },
  };

  it('is walked and read by byte ranges, a few blocks in all', () => {
    read = 0;
    const file = open(source);
    expect(file.hdus.map((hdu) => hdu.type)).toEqual(['image', 'image', 'image']);
    expect(source.size).toBeGreaterThan(2 ** 31);
    expect([...imageAt(file, 2).readRows(1, 1)]).toEqual([5, 6, 7, 8]);
    expect(read).toBeLessThan(6 * 2880);
  });
});
