import { FitsStructure } from 'fits-reader';

/** Bytes of one FITS block (FITS 4.0, section 3.1). */
export const BLOCK_BYTES: number = FitsStructure.BLOCK_SIZE;
/** Bytes of one header card (FITS 4.0, section 4.1). */
export const CARD_BYTES: number = FitsStructure.RECORD_SIZE;

/**
 * Bytes whose text is their characters. The library turns each card into text with `toString()`, written for
 * Node's own buffer class; `subarray` of this class stays this class, so no such buffer is needed here.
 */
class HeaderBytes extends Uint8Array {
  override toString(): string {
    return String.fromCharCode(...this);
  }
}

type LibraryBytes = ConstructorParameters<typeof FitsStructure>[0];

/**
 * The 36 cards of one header block, 80 characters each, one character per byte.
 *
 * The library is used for this and the sizes only. Measured on version 0.0.8: its parsing of keywords cuts strings at
 * a slash, its walk ignores PCOUNT, ends a header at any key that begins with END and needs the whole file in memory.
 *
 * @param block exactly `BLOCK_BYTES` bytes
 * @throws RangeError when the block has another length
 */
export function cardsOfBlock(block: Uint8Array): string[] {
  if (block.length !== BLOCK_BYTES) {
    throw new RangeError(`block must have ${BLOCK_BYTES} bytes, got ${block.length}`);
  }
  const bytes = new HeaderBytes(block);
  return new FitsStructure(bytes as unknown as LibraryBytes).getMetadataBlock(1);
}

/** The length of `bytes` bytes once padded to whole blocks. `bytes` >= 0 and below 2^53. */
export function paddedLength(bytes: number): number {
  return FitsStructure.numBlocks(bytes) * BLOCK_BYTES;
}
