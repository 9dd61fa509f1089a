import fc from 'fast-check';
import { expect, it } from 'vitest';
import type { Hdu } from '../../../../pipeline/decode/fits/index.ts';
import { InputFault } from '../../../../pipeline/errors.ts';
import { bigEndian, IMAGE, imageHeader, joined, open, padded, tableFile } from './hand-made.ts';

const SEED = 20310403;
console.info(`damaged-files property: fast-check seed ${SEED}`);

const WHOLE = joined(
  tableFile(18, 2, ['D', 'PE(2)', '2A'], joined(new Uint8Array(36), bigEndian('Float32', [1, 2]))),
  imageHeader(IMAGE, 16, [3, 2], 'BZERO   = 32768', "OBJECT  = 'any'"),
  padded(bigEndian('Int16', [1, 2, 3, 4, 5, 6])),
);

/** Rows asked for at most: a damaged count of rows must not become the test's own cost. */
const MOST_ROWS = 10;

function readAll(hdu: Hdu): void {
  if (hdu.type === 'other') return;
  const rows = Math.min(MOST_ROWS, hdu.rowCount);
  if (hdu.type === 'image') {
    hdu.readRows(0, rows);
    return;
  }
  for (const [i, column] of hdu.columns.entries()) {
    hdu.readStrings(i, 0, rows);
    if (!'APQX'.includes(column.code)) hdu.readNumbers(i, 0, rows);
  }
}

it('a file with any bytes changed or cut off reads, or fails with a coded fault, and nothing else', () => {
  const change = fc.tuple(fc.nat(WHOLE.length - 1), fc.integer({ min: 0, max: 255 }));
  // Header bytes become other header bytes: plain noise would never get past the ASCII check.
  const quiet = fc.tuple(fc.nat(WHOLE.length - 1), fc.constantFrom(...Buffer.from(" 0123456789=-'TFPEND/&")));
  const changes = fc.oneof(fc.array(change, { maxLength: 8 }), fc.array(quiet, { maxLength: 60 }));
  const ends = { opened: 0, refused: 0 };
  fc.assert(
    fc.property(changes, fc.option(fc.nat(WHOLE.length)), (made, size) => {
      const bytes = WHOLE.slice(0, size ?? WHOLE.length);
      for (const [offset, byte] of made) if (offset < bytes.length) bytes[offset] = byte;
      try {
        const file = open(bytes);
        ends.opened++;
        for (const hdu of file.hdus) readAll(hdu);
      } catch (error) {
        expect(error).toBeInstanceOf(InputFault);
        ends.refused++;
      }
    }),
    { seed: SEED, numRuns: 2000 },
  );
  // Both ends are reached, or the changes would prove nothing.
  expect(Math.min(ends.opened, ends.refused)).toBeGreaterThan(100);
});
