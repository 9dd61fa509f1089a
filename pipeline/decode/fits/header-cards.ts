import { InputFault } from '../../errors.ts';
import type { ByteSource } from '../byte-source.ts';
import { BLOCK_BYTES, CARD_BYTES, cardsOfBlock } from './blocks.ts';
import { beginsHdu, hasKeywordField, isEndCard } from './card.ts';
import type { ReadLimits } from './limits.ts';

/** The cards of one header and where its data begin. */
export interface HeaderCards {
  /** Without the END card. */
  readonly cards: readonly string[];
  /** Byte offset of the data in the source. */
  readonly dataOffset: number;
}

/** FITS 4.0, section 3.2: a header holds the characters from blank to tilde only. */
const FIRST_TEXT_BYTE = 0x20;
const LAST_TEXT_BYTE = 0x7e;

/**
 * Reads the cards of the header that begins at `offset`, block by block, up to and without its END card.
 *
 * @param offset byte offset of the header's first card
 * @param hdu index for messages
 * @throws InputFault fits-no-end, fits-truncated, fits-bad-header
 */
export function readHeaderCards(
  source: ByteSource,
  offset: number,
  hdu: number,
  limits: Pick<ReadLimits, 'headerBlocksPerHdu'>,
): HeaderCards {
  const place = { file: source.label, hdu };
  const cards: string[] = [];
  for (let k = 0; k < limits.headerBlocksPerHdu; k++) {
    const block = source.read(offset + k * BLOCK_BYTES, BLOCK_BYTES);
    if (block.length === 0) {
      throw new InputFault(
        'fits-no-end',
        place,
        `header must close with an END card, got ${cards.length} cards`,
      );
    }
    if (block.length < BLOCK_BYTES) {
      throw new InputFault(
        'fits-truncated',
        place,
        `header block ${k + 1} must have ${BLOCK_BYTES} bytes, got ${block.length}`,
      );
    }
    for (const [i, card] of cardsOfBlock(block).entries()) {
      if (isEndCard(card)) return { cards, dataOffset: offset + (k + 1) * BLOCK_BYTES };
      checkText(block.subarray(i * CARD_BYTES, (i + 1) * CARD_BYTES), card, cards.length + 1, place);
      if (cards.length > 0 && beginsHdu(card)) {
        const detail = `header must close with an END card, got the next header at card ${cards.length + 1}`;
        throw new InputFault('fits-no-end', place, detail);
      }
      cards.push(card);
    }
  }
  const detail = `header must have at most ${limits.headerBlocksPerHdu} blocks (headerBlocksPerHdu), got more`;
  throw new InputFault('fits-no-end', place, detail);
}

function checkText(
  bytes: Uint8Array,
  card: string,
  number: number,
  place: { readonly file: string; readonly hdu: number },
): void {
  const bad = bytes.find((byte) => byte < FIRST_TEXT_BYTE || byte > LAST_TEXT_BYTE);
  if (bad === undefined) return;
  const got = `byte ${bad} in card ${number}`;
  if (hasKeywordField(card)) {
    throw new InputFault('fits-bad-header', place, `header must be ASCII text, got ${got}`);
  }
  // Not even the keyword is one: the walk has left the header and reads data.
  throw new InputFault('fits-no-end', place, `header must close with an END card, got ${got}`);
}
