/** Words summed before carries are folded: 2^20 words below 2^32 stay below 2^53, where doubles are exact. */
const WORDS_PER_FOLD = 1 << 20;
const WORD = 2 ** 32;

/**
 * Ones' complement sum of 32-bit words, most significant byte first (FITS 4.0, appendix J.1).
 *
 * @param bytes length a multiple of 4
 * @param start sum to go on from
 * @returns 0 … 2^32 - 1
 */
export function onesComplementSum(bytes: Uint8Array, start = 0): number {
  if (bytes.length % 4 !== 0) throw new RangeError(`bytes must come in fours, got ${bytes.length}`);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length);
  const words = bytes.length / 4;
  let sum = start;
  for (let first = 0; first < words; first += WORDS_PER_FOLD) {
    const end = Math.min(words, first + WORDS_PER_FOLD);
    for (let i = first; i < end; i++) sum += view.getUint32(4 * i);
    sum = fold(sum);
  }
  return sum;
}

/** Adds the carries back in at the low end until none are left. */
function fold(sum: number): number {
  let folded = sum;
  while (folded >= WORD) folded = (folded % WORD) + Math.floor(folded / WORD);
  return folded;
}

const ZERO = 0x30;

/**
 * The 16 characters that stand for a 32-bit number in the CHECKSUM card (FITS 4.0, appendix J.2): each byte is the sum
 * of four letters or digits, offset by '0', with punctuation moved away in pairs that keep the sum.
 *
 * @param value 0 … 2^32 - 1
 */
export function encodeChecksum(value: number): string {
  const characters = new Array<number>(16);
  for (let i = 0; i < 4; i++) {
    const byte = Math.floor(value / 2 ** (24 - 8 * i)) % 256;
    const quarter = Math.floor(byte / 4) + ZERO;
    const four: [number, number, number, number] = [quarter + (byte % 4), quarter, quarter, quarter];
    while (four.some(isPunctuation)) {
      if (isPunctuation(four[0]) || isPunctuation(four[1])) {
        four[0]++;
        four[1]--;
      }
      if (isPunctuation(four[2]) || isPunctuation(four[3])) {
        four[2]++;
        four[3]--;
      }
    }
    for (let j = 0; j < 4; j++) characters[4 * j + i] = four[j]!;
  }
  // The value begins in column 12, one byte before a word boundary: everything moves on by one.
  return String.fromCharCode(characters[15]!, ...characters.slice(0, 15));
}

/** Between '9' and 'A', or between 'Z' and 'a'. */
function isPunctuation(code: number): boolean {
  return (code >= 0x3a && code <= 0x40) || (code >= 0x5b && code <= 0x60);
}

/**
 * The text of a CHECKSUM card that makes the sum of the whole HDU all ones.
 *
 * @param sum of the HDU while its CHECKSUM card holds sixteen '0'
 */
export function checksumText(sum: number): string {
  return encodeChecksum(WORD - 1 - sum);
}
