import { describe, expect, it } from 'vitest';
import { bytesInMemory } from '../../../../pipeline/decode/byte-source.ts';
import { DEFAULT_READ_LIMITS, readFits } from '../../../../pipeline/decode/fits/index.ts';
import { faultOf } from '../../../support/fault-of.ts';
import {
  bigEndian,
  cards,
  EMPTY_PRIMARY,
  header,
  IMAGE,
  imageAt,
  imageHeader,
  joined,
  latin1,
  open,
  otherAt,
  padded,
  PRIMARY,
  tableAt,
  tableFile,
} from './hand-made.ts';

const PIXELS = padded(bigEndian('Int16', [1, 2, 3]));
const ONE_IMAGE = joined(imageHeader(PRIMARY, 16, [3]), PIXELS);
const EXTENSION = joined(imageHeader(IMAGE, 16, [3], "EXTNAME = 'second'"), PIXELS);

describe('readFits, whole files', () => {
  it('reads a one-dimensional image, which is how a spectrum may stand', () => {
    const image = imageAt(open(ONE_IMAGE), 0);
    expect([image.axes, image.rowCount]).toEqual([[3], 1]);
    expect([...image.readRows(0, 1)]).toEqual([1, 2, 3]);
  });

  it('goes on past END-prefixed keys to the END card, blocks later', () => {
    const filler = Array.from({ length: 40 }, (_, i) => `FILL${i}`.padEnd(8) + `= ${i}`);
    const bytes = joined(
      imageHeader(PRIMARY, 16, [3], 'ENDTIME = 5', 'ENDMJD  = 61234.5', ...filler, 'LAST    = 9'),
      PIXELS,
    );
    const image = imageAt(open(bytes), 0);
    expect(image.header.get('ENDMJD')).toBe(61234.5);
    expect(image.header.get('LAST')).toBe(9);
    expect([...image.readRows(0, 1)]).toEqual([1, 2, 3]);
  });

  it('finds the next HDU behind a variable-length heap', () => {
    const table = tableFile(8, 1, ['1PI(2)'], joined(bigEndian('Int32', [2, 0]), bigEndian('Int16', [7, 8])));
    const file = open(joined(table, EXTENSION));
    expect([...tableAt(file, 1).readCell(0, 0)]).toEqual([7, 8]);
    expect(imageAt(file, 2).name).toBe('second');
  });

  it('steps over random groups, unknown extensions and compressed images, saying why', () => {
    const groups = joined(
      imageHeader(PRIMARY, 16, [0, 3], 'GROUPS  =                    T', 'PCOUNT  = 2', 'GCOUNT  = 4'),
      padded(bigEndian('Int16', new Array<number>(20).fill(1))),
    );
    const unknown = joined(imageHeader("XTENSION= 'FOREIGN '", 8, [5], 'PCOUNT  = 0', 'GCOUNT  = 1'), PIXELS);
    const compressed = tableFile(8, 1, ['1PB(4)'], new Uint8Array(12), ['ZIMAGE  =                    T']);
    const file = open(joined(groups, unknown, compressed.subarray(EMPTY_PRIMARY.length), EXTENSION));
    expect(otherAt(file, 0).reason).toContain('random groups');
    expect(otherAt(file, 1).reason).toContain('FOREIGN');
    expect(otherAt(file, 2).reason).toContain('fits-compressed-image');
    expect([...imageAt(file, 3).readRows(0, 1)]).toEqual([1, 2, 3]);
  });

  it('makes an HDU with unreadable column cards type other and reads on', () => {
    const broken = tableFile(4, 1, ['1Z'], new Uint8Array(4));
    const narrow = tableFile(4, 1, ['1I'], new Uint8Array(4)).subarray(EMPTY_PRIMARY.length);
    const file = open(joined(broken, narrow, EXTENSION));
    expect(otherAt(file, 1).reason).toMatch(/^fits-bad-header: .*TFORM1/);
    expect(otherAt(file, 2).reason).toMatch(/^fits-bad-header: .*NAXIS1 must be the 2 bytes/);
    expect(imageAt(file, 3).name).toBe('second');
  });

  it.each([
    ['zero blocks', new Uint8Array(3 * 2880)],
    ['a few zero bytes', new Uint8Array(17)],
    ['text that is no header', latin1('left over from another file'.repeat(200))],
  ])('passes over %s after the last HDU and counts them', (_, tail) => {
    const file = open(joined(ONE_IMAGE, EXTENSION, tail));
    expect(file.hdus).toHaveLength(2);
    expect(file.fault).toBeNull();
    expect(file.trailingBytes).toBe(tail.length);
  });

  it('forgives missing padding after complete data', () => {
    const file = open(joined(imageHeader(PRIMARY, 16, [3]), bigEndian('Int16', [1, 2, 3])));
    expect(file.fault).toBeNull();
    expect([...imageAt(file, 0).readRows(0, 1)]).toEqual([1, 2, 3]);
  });

  it('reads 3,000 HDUs', () => {
    const file = open(joined(EMPTY_PRIMARY, ...Array.from({ length: 2999 }, () => EXTENSION)));
    expect(file.hdus).toHaveLength(3000);
    expect([...imageAt(file, 2999).readRows(0, 1)]).toEqual([1, 2, 3]);
  });
});

describe('readFits, broken files', () => {
  it.each([
    ['no bytes', new Uint8Array(0), 'file-empty'],
    ['100 bytes of text', latin1('x'.repeat(100)), 'file-kind-unknown'],
    ['100 bytes of a header', cards(PRIMARY, 'BITPIX  = 8').subarray(0, 100), 'fits-truncated'],
    ['a gzip stream', Uint8Array.of(0x1f, 0x8b, 8, 0, 0, 0, 0, 0), 'file-kind-unknown'],
    ['an extension first', EXTENSION, 'file-kind-unknown'],
    ['SIMPLE = F', imageHeader('SIMPLE  =                    F', 8, []), 'fits-unsupported'],
    ['a header without END at the end of the file', padded(cards(PRIMARY), 0x20), 'fits-no-end'],
    [
      'a header without END before zeros',
      joined(padded(cards(PRIMARY), 0x20), new Uint8Array(2880)),
      'fits-no-end',
    ],
    ['a letter outside ASCII', header(PRIMARY, "OBSERVER= 'J\u00fcrgen'"), 'fits-bad-header'],
    ['a tab', header(PRIMARY, 'COMMENT a\tb'), 'fits-bad-header'],
    ['no BITPIX', header(PRIMARY, 'NAXIS   = 0'), 'fits-bad-header'],
    ['BITPIX = 12', imageHeader(PRIMARY, 12, [3]), 'fits-bad-header'],
    ['a negative axis', imageHeader(PRIMARY, 8, [-3]), 'fits-bad-header'],
    ['a missing NAXIS2', header(PRIMARY, 'BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 4'), 'fits-bad-header'],
    ['a size beyond 2^53', imageHeader(PRIMARY, 8, [2 ** 40, 2 ** 40]), 'fits-bad-header'],
  ])('refuses %s by code %#', (_, bytes, code) => {
    expect(faultOf(() => open(bytes)).code).toBe(code);
  });

  it('refuses every one of 200 seeded strings of junk as another kind of file', () => {
    // Linear congruential generator of Lehmer (1951) with the constants of Park & Miller (1988).
    let state = 20310402;
    for (let k = 0; k < 200; k++) {
      const junk = Uint8Array.from(
        { length: 1 + ((k * 97) % 6000) },
        () => (state = (state * 48271) % 2147483647),
      );
      expect(faultOf(() => open(junk)).code).toBe('file-kind-unknown');
    }
  });

  it('stops at a primary header without END instead of merging it with the next', () => {
    const noEnd = padded(cards(PRIMARY, 'BITPIX  = 8', 'NAXIS   = 0'), 0x20);
    const fault = faultOf(() => open(joined(noEnd, EXTENSION)));
    expect(fault.code).toBe('fits-no-end');
    expect(fault.place.hdu).toBe(0);
  });

  it('keeps the HDUs before an extension without END', () => {
    const noEnd = padded(cards(IMAGE, 'BITPIX  = 8', 'NAXIS   = 0'), 0x20);
    const file = open(joined(ONE_IMAGE, noEnd, EXTENSION));
    expect(file.hdus).toHaveLength(1);
    expect(file.fault).toMatchObject({ code: 'fits-no-end', place: { file: 'made.fits', hdu: 1 } });
    expect([...imageAt(file, 0).readRows(0, 1)]).toEqual([1, 2, 3]);
  });

  it('stops at the limits and names the option', () => {
    const bytes = joined(ONE_IMAGE, EXTENSION, EXTENSION);
    const file = readFits(bytesInMemory('made.fits', bytes), { ...DEFAULT_READ_LIMITS, hdusPerFile: 2 });
    expect(file.hdus).toHaveLength(2);
    expect(file.fault).toMatchObject({ code: 'file-too-large' });
    expect(file.fault?.message).toContain('hdusPerFile');
    const oneBlock = { ...DEFAULT_READ_LIMITS, headerBlocksPerHdu: 1 };
    const long = header(PRIMARY, ...Array.from({ length: 40 }, () => 'COMMENT long'));
    const fault = faultOf(() => readFits(bytesInMemory('made.fits', long), oneBlock));
    expect(fault.message).toContain('headerBlocksPerHdu');
  });
});

describe('readFits, truncated files', () => {
  const rows = imageHeader(IMAGE, -32, [4, 10]);
  const data = padded(
    bigEndian(
      'Float32',
      Array.from({ length: 40 }, (_, i) => i),
    ),
  );
  const whole = joined(ONE_IMAGE, rows, data);
  const dataStart = ONE_IMAGE.length + rows.length;

  it('keeps whole rows of a cut image readable and names HDU and row of the first one missing', () => {
    // Seven rows of 16 bytes and half of the eighth.
    const file = open(whole.subarray(0, dataStart + 7 * 16 + 8));
    expect(file.fault).toMatchObject({ code: 'fits-truncated', place: { file: 'made.fits', hdu: 1 } });
    const image = imageAt(file, 1);
    expect([...image.readRows(6, 1)]).toEqual([24, 25, 26, 27]);
    const fault = faultOf(() => image.readRows(5, 3));
    expect(fault.code).toBe('fits-truncated');
    expect(fault.place).toEqual({ file: 'made.fits', hdu: 1, row: 7 });
    expect(fault.message).toContain('HDU 1 row 7');
  });

  it('reads what is whole, or says fits-truncated, at every possible cut', () => {
    for (let size = 1; size < whole.length; size += 61) {
      const cut = whole.subarray(0, size);
      if (size < ONE_IMAGE.length - PIXELS.length) {
        expect(['fits-truncated', 'file-kind-unknown']).toContain(faultOf(() => open(cut)).code);
        continue;
      }
      const file = open(cut);
      const dataBytes = size - dataStart;
      if (file.hdus.length < 2 || dataBytes < 0) continue;
      const wholeRows = Math.min(10, Math.floor(dataBytes / 16));
      const image = imageAt(file, 1);
      expect(image.readRows(0, wholeRows)).toHaveLength(4 * wholeRows);
      expect(file.fault === null).toBe(wholeRows === 10);
      if (wholeRows < 10) expect(faultOf(() => image.readRows(0, 10)).place.row).toBe(wholeRows);
    }
  });

  it('says fits-truncated for a header cut inside a block', () => {
    const file = open(whole.subarray(0, ONE_IMAGE.length + 500));
    expect(file.hdus).toHaveLength(1);
    expect(file.fault).toMatchObject({ code: 'fits-truncated', place: { hdu: 1 } });
  });

  it('keeps whole rows of a cut table readable', () => {
    const bytes = tableFile(
      8,
      300,
      ['D'],
      bigEndian(
        'Float64',
        Array.from({ length: 300 }, (_, i) => i),
      ),
    );
    const file = open(bytes.subarray(0, 2 * 2880 + 100 * 8 + 3));
    const table = tableAt(file, 1);
    expect(table.readNumbers(0, 99, 1)[0]).toBe(99);
    expect(faultOf(() => table.readNumbers(0, 0, 300)).place).toEqual({
      file: 'made.fits',
      hdu: 1,
      row: 100,
    });
  });
});
