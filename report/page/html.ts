/** Markup that is known to be safe. Only `html` and `trusted` make it. */
export class Markup {
  readonly text: string;
  constructor(text: string) {
    this.text = text;
  }
}

export type Insert = string | number | Markup | null | readonly Insert[];

/**
 * Template tag for markup: every inserted value is escaped unless it is Markup itself, so a target name that
 * looks like a tag arrives as text. Arrays are joined, null is nothing. Valid in element content and inside
 * double-quoted attributes.
 */
export function html(strings: TemplateStringsArray, ...inserts: readonly Insert[]): Markup {
  let text = strings[0]!;
  for (let i = 0; i < inserts.length; i++) text += inserted(inserts[i]!) + strings[i + 1]!;
  return new Markup(text);
}

/** Marks text of our own (style sheet, script) as markup. Never for anything that came from outside. */
export function trusted(text: string): Markup {
  return new Markup(text);
}

function inserted(insert: Insert): string {
  if (insert === null) return '';
  if (insert instanceof Markup) return insert.text;
  if (typeof insert === 'string') return escaped(insert);
  if (typeof insert === 'number') return String(insert);
  return insert.map(inserted).join('');
}

/** Characters HTML forbids even as references (WHATWG HTML, 13.2.5): controls, half surrogate pairs, non-characters. */
const FORBIDDEN = /(?![\t\n\r])[\p{Control}\p{Surrogate}\u{FFFE}\u{FFFF}]/gu;

function escaped(text: string): string {
  return text
    .replace(FORBIDDEN, '\u{FFFD}')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** Longest text from outside that is shown in full; names of surveys stay well below. */
const SHOWN_LENGTH = 160;

/**
 * Text from an input as the page shows it: cut when absurdly long, and isolated (`bdi`) so that right-to-left
 * marks in it cannot turn the text around it.
 */
export function outside(text: string): Markup {
  const characters = Array.from(text);
  const cut = characters.length > SHOWN_LENGTH;
  return html`<bdi>${cut ? `${characters.slice(0, SHOWN_LENGTH).join('')}…` : text}</bdi>`;
}

/**
 * JSON for a data block inside a script element: no `<` may stay, or `</script` or `<!--` in a text would end or
 * change the block (WHATWG HTML, 4.12.1.3).
 */
export function jsonBlock(value: unknown): Markup {
  return new Markup(JSON.stringify(value).replaceAll('<', '\\u003c'));
}
