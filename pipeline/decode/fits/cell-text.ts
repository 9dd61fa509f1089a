/**
 * Characters of a text cell: up to the first NUL, without trailing blanks (FITS 4.0, section 7.3.3.1). One character
 * per byte, so bytes beyond ASCII come through as Latin-1.
 */
export function cellText(bytes: Uint8Array): string {
  let end = bytes.indexOf(0);
  if (end < 0) end = bytes.length;
  while (end > 0 && bytes[end - 1] === BLANK) end--;
  let text = '';
  for (let i = 0; i < end; i++) text += String.fromCharCode(bytes[i]!);
  return text;
}

const BLANK = 0x20;

/** A logical cell: 'T' true, 'F' false, any other byte (the standard's is 0) undefined. */
export function cellLogical(byte: number): boolean | null {
  if (byte === TRUE) return true;
  return byte === FALSE ? false : null;
}

const TRUE = 0x54;
const FALSE = 0x46;

/** `count` bits as 0 and 1, most significant bit of the first byte first. */
export function cellBits(bytes: Uint8Array, count: number): string {
  let text = '';
  for (let i = 0; i < count; i++) text += String((bytes[i >> 3]! >> (7 - (i & 7))) & 1);
  return text;
}

/**
 * A number as the shortest decimal text that reads back to it; empty for NaN, which stands for missing.
 *
 * @param single whether the value was stored in single precision: 0.1, not 0.10000000149011612
 */
export function numberText(value: number, single: boolean): string {
  if (Number.isNaN(value)) return '';
  if (!single || !Number.isFinite(value)) return String(value);
  // Nine digits always tell two single-precision numbers apart (IEEE 754).
  for (let digits = 1; digits < 9; digits++) {
    const text = Number(value.toPrecision(digits));
    if (Math.fround(text) === value) return String(text);
  }
  return String(Number(value.toPrecision(9)));
}
