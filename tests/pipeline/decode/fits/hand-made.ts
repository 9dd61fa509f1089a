import type { ByteSource } from '../../../../pipeline/decode/byte-source.ts';
import { bytesInMemory } from '../../../../pipeline/decode/byte-source.ts';
import type { FitsFile, ImageHdu, OtherHdu, TableHdu } from '../../../../pipeline/decode/fits/index.ts';
import { DEFAULT_READ_LIMITS, readFits } from '../../../../pipeline/decode/fits/index.ts';

/** Files put together byte by byte, so that the reader is not tested with the project's own writer. */

const BLOCK = 2880;

/** Cards padded to 80 characters, without END and without padding to blocks. */
export function cards(...lines: readonly string[]): Uint8Array {
  return latin1(lines.map((line) => line.padEnd(80)).join(''));
}

/** A header: the cards, END, blanks up to whole blocks. */
export function header(...lines: readonly string[]): Uint8Array {
  return padded(cards(...lines, 'END'), 0x20);
}

/** Bytes padded to whole blocks, with zeros unless told otherwise. */
export function padded(bytes: Uint8Array, filler = 0): Uint8Array {
  const out = new Uint8Array(Math.ceil(bytes.length / BLOCK) * BLOCK).fill(filler);
  out.set(bytes);
  return out;
}

export function joined(...parts: readonly Uint8Array[]): Uint8Array {
  const out = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let offset = 0;
  for (const part of parts) {
    out.set(part, offset);
    offset += part.length;
  }
  return out;
}

/** One byte per character. */
export function latin1(text: string): Uint8Array {
  return Uint8Array.from(text, (character) => character.charCodeAt(0));
}

export type Stored = 'Int16' | 'Int32' | 'BigInt64' | 'Float32' | 'Float64';
const STORED_BYTES = { Int16: 2, Int32: 4, BigInt64: 8, Float32: 4, Float64: 8 } as const;

/** Numbers with the most significant byte first. */
export function bigEndian(type: Stored, values: readonly (number | bigint)[]): Uint8Array {
  const size = STORED_BYTES[type];
  const view = new DataView(new ArrayBuffer(values.length * size));
  for (const [i, value] of values.entries()) {
    if (type === 'BigInt64') view.setBigInt64(i * size, BigInt(value));
    else view[`set${type}`](i * size, Number(value));
  }
  return new Uint8Array(view.buffer);
}

export const EMPTY_PRIMARY = header(
  'SIMPLE  =                    T',
  'BITPIX  =                    8',
  'NAXIS   =                    0',
);

/** Header cards of an image; `first` is its SIMPLE or XTENSION card. */
export function imageHeader(
  first: string,
  bitpix: number,
  axes: readonly number[],
  ...more: string[]
): Uint8Array {
  return header(
    first,
    `BITPIX  = ${bitpix}`,
    `NAXIS   = ${axes.length}`,
    ...axes.map((axis, i) => `NAXIS${i + 1}`.padEnd(8) + `= ${axis}`),
    ...more,
  );
}

export const PRIMARY = 'SIMPLE  =                    T';
export const IMAGE = "XTENSION= 'IMAGE   '";

/** A file of one binary table; `forms` are the TFORM values. */
export function tableFile(
  rowBytes: number,
  rowCount: number,
  forms: readonly string[],
  data: Uint8Array,
  more: readonly string[] = [],
): Uint8Array {
  const head = header(
    "XTENSION= 'BINTABLE'",
    'BITPIX  = 8',
    'NAXIS   = 2',
    `NAXIS1  = ${rowBytes}`,
    `NAXIS2  = ${rowCount}`,
    `PCOUNT  = ${data.length - rowBytes * rowCount}`,
    'GCOUNT  = 1',
    `TFIELDS = ${forms.length}`,
    ...forms.map((form, i) => `TFORM${i + 1}`.padEnd(8) + `= '${form}'`),
    ...forms.map((_, i) => `TTYPE${i + 1}`.padEnd(8) + `= 'c${i + 1}'`),
    ...more,
  );
  return joined(EMPTY_PRIMARY, head, padded(data));
}

export function open(input: Uint8Array | ByteSource): FitsFile {
  return readFits(
    input instanceof Uint8Array ? bytesInMemory('made.fits', input) : input,
    DEFAULT_READ_LIMITS,
  );
}

export function imageAt(file: FitsFile, index: number): ImageHdu {
  const hdu = file.hdus[index];
  if (hdu?.type !== 'image') throw new Error(`HDU ${index} is ${hdu?.type ?? 'absent'}, not an image`);
  return hdu;
}

export function tableAt(file: FitsFile, index: number): TableHdu {
  const hdu = file.hdus[index];
  if (hdu?.type !== 'table') throw new Error(`HDU ${index} is ${hdu?.type ?? 'absent'}, not a table`);
  return hdu;
}

export function otherAt(file: FitsFile, index: number): OtherHdu {
  const hdu = file.hdus[index];
  if (hdu?.type !== 'other') throw new Error(`HDU ${index} is ${hdu?.type ?? 'absent'}, not other`);
  return hdu;
}
