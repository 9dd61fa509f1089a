import type { CardValue } from './model.ts';

/** What one 80-character card says. */
export type ParsedCard =
  | { readonly kind: 'value'; readonly keyword: string; readonly value: CardValue }
  /** A string value as written: doubled quotes undone, trailing blanks kept (they count before a `&`). */
  | { readonly kind: 'text'; readonly keyword: string; readonly text: string }
  | { readonly kind: 'continue'; readonly text: string }
  | { readonly kind: 'comment'; readonly text: string }
  /** The card has a value field that no form of the standard fits. */
  | { readonly kind: 'malformed'; readonly keyword: string }
  | { readonly kind: 'end' };

const KEYWORD_LENGTH = 8;
const VALUE_INDICATOR = '= ';
const VALUE_START = KEYWORD_LENGTH + VALUE_INDICATOR.length;
const COMMENTARY = new Set(['', 'COMMENT', 'HISTORY']);

const INTEGER = /^[+-]?\d+$/;
/** FITS 4.0, section 4.2.4; the exponent letter may be D as in Fortran. */
const REAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[EDed][+-]?\d+)?$/;
/** Complex values (FITS 4.0, sections 4.2.5 and 4.2.6) are kept as text. */
const COMPLEX = /^\([^(),]+,[^(),]+\)$/;
/** A quoted string with doubled quotes inside, then nothing but a comment. */
const QUOTED = /^'((?:[^']|'')*)'\s*(?:\/.*)?$/;
const HIERARCH = /^HIERARCH\s+([^=]*[^=\s])\s*=(.*)$/;

/** Whether a card begins the header of an HDU. */
export function beginsHdu(card: string): boolean {
  return card.startsWith('SIMPLE  =') || card.startsWith('XTENSION=');
}

/** Whether a card is END alone: keys such as ENDTIME are ordinary keys. */
export function isEndCard(card: string): boolean {
  return card.trimEnd() === 'END';
}

/** Whether a card's first eight characters can be a keyword (FITS 4.0, section 4.1.2.1), in either case. */
export function hasKeywordField(card: string): boolean {
  return /^[A-Za-z0-9_-]* *$/.test(card.slice(0, KEYWORD_LENGTH));
}

/**
 * Reads one card (FITS 4.0, section 4; HIERARCH as in the registered ESO convention).
 *
 * @param card 80 ASCII characters; shorter text is read as if padded with blanks
 */
export function parseCard(card: string): ParsedCard {
  if (isEndCard(card)) return { kind: 'end' };
  const keyword = card.slice(0, KEYWORD_LENGTH).trimEnd().toUpperCase();
  if (COMMENTARY.has(keyword)) return { kind: 'comment', text: card.slice(KEYWORD_LENGTH).trimEnd() };
  if (keyword === 'CONTINUE') {
    const quoted = QUOTED.exec(card.slice(KEYWORD_LENGTH).trim());
    return quoted === null
      ? { kind: 'comment', text: card.trimEnd() }
      : { kind: 'continue', text: undouble(quoted[1]!) };
  }
  const hierarchy = keyword === 'HIERARCH' ? HIERARCH.exec(card) : null;
  if (hierarchy !== null) {
    return parseValue(hierarchy[1]!.split(/\s+/).join(' ').toUpperCase(), hierarchy[2]!);
  }
  if (card.slice(KEYWORD_LENGTH, VALUE_START) !== VALUE_INDICATOR) {
    return { kind: 'comment', text: card.trimEnd() };
  }
  return parseValue(keyword, card.slice(VALUE_START));
}

function parseValue(keyword: string, field: string): ParsedCard {
  const trimmed = field.trim();
  if (trimmed.startsWith("'")) {
    const quoted = QUOTED.exec(trimmed);
    return quoted === null
      ? { kind: 'malformed', keyword }
      : { kind: 'text', keyword, text: undouble(quoted[1]!) };
  }
  const slash = trimmed.indexOf('/');
  const value = parseToken((slash < 0 ? trimmed : trimmed.slice(0, slash)).trim());
  return value === undefined ? { kind: 'malformed', keyword } : { kind: 'value', keyword, value };
}

function parseToken(token: string): CardValue | undefined {
  if (token === '') return null;
  if (token === 'T') return true;
  if (token === 'F') return false;
  if (INTEGER.test(token)) {
    const value = Number(token);
    // BigInt() refuses a leading plus sign.
    return Number.isSafeInteger(value) ? value : BigInt(token.replace(/^\+/, ''));
  }
  if (REAL.test(token)) {
    const value = Number(token.replace(/d/i, 'E'));
    return Number.isFinite(value) ? value : undefined;
  }
  return COMPLEX.test(token) ? token : undefined;
}

function undouble(text: string): string {
  return text.replaceAll("''", "'");
}
