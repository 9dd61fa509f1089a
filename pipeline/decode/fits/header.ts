import type { FaultPlace } from '../../errors.ts';
import { InputFault } from '../../errors.ts';
import { parseCard } from './card.ts';
import type { CardValue, Header } from './model.ts';

/** A header that also knows which of its values could not be read. */
export interface ParsedHeader extends Header {
  /** Keywords whose value fits no form of the standard; `get` gives null for them. */
  readonly malformed: ReadonlySet<string>;
}

/**
 * Builds a header from its cards. The first card of a repeated keyword counts: the standard leaves the choice open
 * (FITS 4.0, section 4.1.2.3) and the mandatory cards come first.
 *
 * @param cards 80 characters each, without the END card
 */
export function buildHeader(cards: readonly string[]): ParsedHeader {
  const values = new Map<string, CardValue>();
  const comments: string[] = [];
  const malformed = new Set<string>();
  for (let i = 0; i < cards.length; i++) {
    const card = parseCard(cards[i]!);
    switch (card.kind) {
      case 'value':
        if (!values.has(card.keyword)) values.set(card.keyword, card.value);
        break;
      case 'text': {
        const long = joinContinued(card.text, cards, i + 1);
        if (!values.has(card.keyword)) values.set(card.keyword, long.text.trimEnd());
        i += long.used;
        break;
      }
      case 'malformed':
        if (!values.has(card.keyword)) {
          values.set(card.keyword, null);
          malformed.add(card.keyword);
        }
        break;
      case 'comment':
      case 'continue':
        if (card.text.trim() !== '') comments.push(card.text);
        break;
      case 'end':
        break;
    }
  }
  const keywords = [...values.keys()];
  return {
    get: (keyword) => values.get(keyword.toUpperCase().replace(/^HIERARCH +/, '')),
    keys: () => keywords,
    comments,
    malformed,
  };
}

/** Long strings: a piece that ends in `&` goes on in the next CONTINUE card (FITS 4.0, section 4.2.1.2). */
function joinContinued(
  first: string,
  cards: readonly string[],
  next: number,
): { readonly text: string; readonly used: number } {
  let text = first;
  let used = 0;
  while (text.trimEnd().endsWith('&') && next + used < cards.length) {
    const card = parseCard(cards[next + used]!);
    // Without a CONTINUE card the ampersand is part of the text.
    if (card.kind !== 'continue') break;
    text = text.trimEnd().slice(0, -1) + card.text;
    used++;
  }
  return { text, used };
}

/**
 * An integer keyword. `fallback` is what an absent or undefined value means; without it the keyword is mandatory.
 *
 * @throws InputFault fits-bad-header when the value is not an integer below 2^53, or is missing without a fallback
 */
export function integerCard(
  header: ParsedHeader,
  keyword: string,
  place: FaultPlace,
  fallback?: number,
): number {
  const value = numberCard(header, keyword, place, fallback);
  if (typeof value === 'bigint' || !Number.isInteger(value)) {
    throw badCard(place, keyword, 'an integer below 2^53', value);
  }
  return value;
}

/**
 * A numeric keyword; integers beyond 2^53 come as bigint.
 *
 * @throws InputFault fits-bad-header when the value is not a number, or is missing without a fallback
 */
export function numberCard(
  header: ParsedHeader,
  keyword: string,
  place: FaultPlace,
  fallback?: number,
): number | bigint {
  if (header.malformed.has(keyword)) throw badCard(place, keyword, 'a number', 'an unreadable value');
  const value = header.get(keyword);
  if (typeof value === 'number' || typeof value === 'bigint') return value;
  if ((value === undefined || value === null) && fallback !== undefined) return fallback;
  throw badCard(place, keyword, 'a number', value === undefined ? 'no card' : value);
}

/**
 * A string keyword, trimmed; empty when absent or undefined.
 *
 * @throws InputFault fits-bad-header when the value is not a string
 */
export function textCard(header: ParsedHeader, keyword: string, place: FaultPlace): string {
  if (header.malformed.has(keyword)) throw badCard(place, keyword, 'a string', 'an unreadable value');
  const value = header.get(keyword);
  if (value === undefined || value === null) return '';
  if (typeof value !== 'string') throw badCard(place, keyword, 'a string', value);
  return value.trim();
}

function badCard(place: FaultPlace, keyword: string, expected: string, got: CardValue): InputFault {
  return new InputFault('fits-bad-header', place, `${keyword} must be ${expected}, got ${String(got)}`);
}

/**
 * An integer keyword of any size; null when absent or undefined.
 *
 * @throws InputFault fits-bad-header when the value is not an integer
 */
export function integerOrNull(
  header: ParsedHeader,
  keyword: string,
  place: FaultPlace,
): number | bigint | null {
  if (!header.malformed.has(keyword) && (header.get(keyword) ?? null) === null) return null;
  const value = numberCard(header, keyword, place);
  if (typeof value === 'number' && !Number.isInteger(value)) {
    throw badCard(place, keyword, 'an integer', value);
  }
  return value;
}
