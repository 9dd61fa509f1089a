import { putAscii } from './ascii.ts';
import { cardText, isLongString } from './card-text.ts';
import { checksumText, onesComplementSum } from './checksum.ts';
import type { HduParts } from './hdu-parts.ts';
import { BLOCK_BYTES } from './hdu-parts.ts';
import type { CardSpec, HduSpec, ImageSpec } from './hdu-spec.ts';
import { imageParts } from './image-hdu.ts';
import { tableParts } from './table-hdu.ts';

const HEADER_ONLY: ImageSpec = { type: 'image', axes: [] };
const NO_CHECKSUM = '0000000000000000';
const CARD_LENGTH = 80;
/** Columns 12 to 27 of a card hold the characters of a 16-letter string. */
const STRING_START = 11;

/**
 * A whole FITS file (FITS 4.0) with a DATASUM and a CHECKSUM card in every HDU.
 *
 * @param hdus the first one becomes the primary HDU; before a table an HDU without data is put, as a table cannot be
 *   the primary
 * @throws RangeError when a value, text or shape cannot be written
 */
export function encodeFits(hdus: readonly HduSpec[]): Uint8Array<ArrayBuffer> {
  const chunks = [...encodeFitsChunks(hdus)];
  const file = new Uint8Array(chunks.reduce((sum, chunk) => sum + chunk.length, 0));
  let offset = 0;
  for (const chunk of chunks) {
    file.set(chunk, offset);
    offset += chunk.length;
  }
  return file;
}

/**
 * The same file in pieces, header and data of one HDU after the other: only one HDU is held in memory when `hdus` makes
 * them on demand.
 *
 * @throws RangeError as `encodeFits`, while iterating
 */
export function* encodeFitsChunks(hdus: Iterable<HduSpec>): Generator<Uint8Array<ArrayBuffer>, void> {
  let isPrimary = true;
  for (const hdu of hdus) {
    if (isPrimary && hdu.type === 'table') {
      yield* hduChunks(HEADER_ONLY, true);
      isPrimary = false;
    }
    yield* hduChunks(hdu, isPrimary);
    isPrimary = false;
  }
  if (isPrimary) yield* hduChunks(HEADER_ONLY, true);
}

function* hduChunks(hdu: HduSpec, isPrimary: boolean): Generator<Uint8Array<ArrayBuffer>, void> {
  const parts = hdu.type === 'image' ? imageParts(hdu, isPrimary) : tableParts(hdu);
  const dataSum = onesComplementSum(parts.data);
  yield headerBytes(headerCards(hdu, parts, isPrimary, dataSum), dataSum);
  if (parts.data.length > 0) yield parts.data;
}

function headerCards(hdu: HduSpec, parts: HduParts, isPrimary: boolean, dataSum: number): CardSpec[] {
  const own = hdu.cards ?? [];
  const described = [...parts.structure, ...own];
  const hasLong = described.some((card) => 'value' in card && isLong(card.value));
  return [
    isPrimary
      ? { keyword: 'SIMPLE', value: true, comment: 'conforms to the FITS standard' }
      : { keyword: 'XTENSION', value: parts.extension },
    ...parts.structure,
    ...(hdu.name === undefined ? [] : [{ keyword: 'EXTNAME', value: hdu.name }]),
    ...(hasLong
      ? [{ keyword: 'LONGSTRN', value: 'OGIP 1.0', comment: 'long strings go on in CONTINUE' }]
      : []),
    ...own,
    { keyword: 'DATASUM', value: String(dataSum), comment: 'ones complement sum of the data' },
    { keyword: 'CHECKSUM', value: NO_CHECKSUM, comment: 'makes the sum of this HDU all ones' },
  ];
}

function isLong(value: unknown): boolean {
  return typeof value === 'string' && isLongString(value);
}

/** Lays the cards out in blocks and fills in the checksum, which is the last card before END. */
function headerBytes(cards: readonly CardSpec[], dataSum: number): Uint8Array<ArrayBuffer> {
  const lines = cards.flatMap(cardText);
  const text = lines.join('') + 'END';
  const bytes = new Uint8Array(Math.ceil(text.length / BLOCK_BYTES) * BLOCK_BYTES).fill(0x20);
  putAscii(bytes, 0, text);
  const sum = onesComplementSum(bytes, dataSum);
  putAscii(bytes, (lines.length - 1) * CARD_LENGTH + STRING_START, checksumText(sum));
  return bytes;
}
