import { requireAscii } from './ascii.ts';
import type { CardSpec } from './hdu-spec.ts';

const CARD_LENGTH = 80;
const KEYWORD_LENGTH = 8;
/** Fixed format: numbers and logicals end in column 30 (FITS 4.0, section 4.2). */
const FIXED_VALUE_LENGTH = 20;
/** Fixed format: a string has at least eight characters between its quotes (FITS 4.0, section 4.2.1.1). */
const SHORTEST_STRING = 8;
/** Characters between the quotes of one card. */
const LONGEST_STRING = CARD_LENGTH - KEYWORD_LENGTH - 2 - 2;
const COMMENTARY_LENGTH = CARD_LENGTH - KEYWORD_LENGTH;
const KEYWORD = /^[A-Z0-9_-]{1,8}$/;

/**
 * The 80-character cards of one specification: several for long strings and long commentary.
 *
 * @throws RangeError for a keyword, text or number that FITS cannot hold
 */
export function cardText(card: CardSpec): string[] {
  if (!KEYWORD.test(card.keyword)) {
    throw new RangeError(`keyword must be 1 to 8 of A-Z, 0-9, _ and -, got '${card.keyword}'`);
  }
  if ('text' in card) return commentary(card.keyword, card.text);
  const comment = card.comment ?? '';
  requireAscii(comment, `comment of ${card.keyword}`);
  const head = `${card.keyword.padEnd(KEYWORD_LENGTH)}= `;
  if (typeof card.value === 'string') return stringCards(head, card.keyword, card.value, comment);
  return [withComment(head + scalarText(card.keyword, card.value).padStart(FIXED_VALUE_LENGTH), comment)];
}

/** Whether a string needs CONTINUE cards. */
export function isLongString(text: string): boolean {
  return doubled(text).length > LONGEST_STRING;
}

function commentary(keyword: string, text: string): string[] {
  requireAscii(text, keyword);
  const cards: string[] = [];
  for (let start = 0; start === 0 || start < text.length; start += COMMENTARY_LENGTH) {
    const piece = text.slice(start, start + COMMENTARY_LENGTH);
    cards.push((keyword.padEnd(KEYWORD_LENGTH) + piece).padEnd(CARD_LENGTH));
  }
  return cards;
}

function stringCards(head: string, keyword: string, text: string, comment: string): string[] {
  requireAscii(text, keyword);
  if (!isLongString(text)) {
    const quoted = `'${doubled(text).padEnd(SHORTEST_STRING)}'`;
    return [withComment(head + quoted.padEnd(FIXED_VALUE_LENGTH), comment)];
  }
  const pieces = stringPieces(text);
  return pieces.map((piece, i) => {
    const start = i === 0 ? head : 'CONTINUE  ';
    return i < pieces.length - 1
      ? `${start}'${piece}&'`.padEnd(CARD_LENGTH)
      : withComment(`${start}'${piece}'`, comment);
  });
}

/** Pieces that leave room for the `&`; a doubled quote is never torn apart. */
function stringPieces(text: string): string[] {
  const pieces: string[] = [];
  let piece = '';
  for (const character of text) {
    const written = doubled(character);
    if (piece.length + written.length > LONGEST_STRING - 1) {
      pieces.push(piece);
      piece = '';
    }
    piece += written;
  }
  pieces.push(piece);
  return pieces;
}

function withComment(card: string, comment: string): string {
  const text = comment === '' ? card : `${card} / ${comment}`;
  return text.slice(0, CARD_LENGTH).trimEnd().padEnd(CARD_LENGTH);
}

function scalarText(keyword: string, value: number | boolean | bigint | null): string {
  if (value === null) return '';
  if (typeof value === 'boolean') return value ? 'T' : 'F';
  if (typeof value === 'bigint' || Number.isSafeInteger(value)) return value.toString();
  if (!Number.isFinite(value)) throw new RangeError(`${keyword} must be finite, got ${value}`);
  const [mantissa, exponent] = value.toString().split('e');
  if (exponent !== undefined) return `${mantissa!}E${exponent.replace('+', '')}`;
  // Beyond 2^53 a number without a point or exponent would read as an exact integer.
  return mantissa!.includes('.') ? mantissa! : `${mantissa!}.`;
}

function doubled(text: string): string {
  return text.replaceAll("'", "''");
}
