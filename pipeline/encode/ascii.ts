const PRINTABLE = /^[ -~]*$/;
/** Marks that a decomposed letter leaves behind, e.g. the dots of an umlaut. */
const COMBINING_MARKS = /\p{M}/gu;

/**
 * Checks that text can stand in a FITS file (FITS 4.0, sections 3.2 and 7.3.3.1).
 *
 * @param what named in the message
 * @throws RangeError when a character is not printable ASCII; `asciiText` makes one that is
 */
export function requireAscii(text: string, what: string): void {
  if (PRINTABLE.test(text)) return;
  throw new RangeError(`${what} must be printable ASCII, got ${JSON.stringify(text)}`);
}

/** Text in printable ASCII: letters lose their marks (é becomes e), any other character becomes `?`. */
export function asciiText(text: string): string {
  return text
    .normalize('NFKD')
    .replace(COMBINING_MARKS, '')
    .replace(/[^ -~]/gu, '?');
}

/** Writes ASCII text into `bytes` from `offset`, one byte per character. */
export function putAscii(bytes: Uint8Array, offset: number, text: string): void {
  for (let i = 0; i < text.length; i++) bytes[offset + i] = text.charCodeAt(i);
}
