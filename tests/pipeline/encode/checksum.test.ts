import { describe, expect, it } from 'vitest';
import { checksumText, encodeChecksum, onesComplementSum } from '../../../pipeline/encode/checksum.ts';

describe('encodeChecksum', () => {
  it('encodes the number that the test program of CFITSIO prints', () => {
    // "Encode checksum: 1234567890 -> dCW2fBU0dBU0dBU0", CFITSIO testprog.out; from memory, and astropy 5.2.1 agrees.
    expect(encodeChecksum(1234567890)).toBe('dCW2fBU0dBU0dBU0');
  });

  it('encodes the complement of 868229149 as astropy does', () => {
    // astropy 5.2.1, _ValidHDU._char_encode(~868229149 & 0xffffffff).
    expect(checksumText(868229149)).toBe('hcHjjc9ghcEghc9g');
  });

  it('uses letters and digits only and keeps the sum of every byte', () => {
    for (let byte = 0; byte < 256; byte++) {
      const text = encodeChecksum(byte * 0x01010101);
      expect(text).toMatch(/^[0-9A-Za-z]{16}$/);
      const codes = Array.from(text, (character) => character.charCodeAt(0));
      // Turned back by one, each of the four columns of four characters sums to its byte plus four times '0'.
      const turned = [...codes.slice(1), codes[0]!];
      for (let i = 0; i < 4; i++) {
        expect([0, 4, 8, 12].reduce((sum, j) => sum + turned[i + j]!, 0)).toBe(byte + 4 * 0x30);
      }
    }
  });
});

describe('onesComplementSum', () => {
  it('brings carries back in at the low end', () => {
    expect(onesComplementSum(Uint8Array.of(255, 255, 255, 255, 0, 0, 0, 1))).toBe(1);
    expect(onesComplementSum(Uint8Array.of(0x80, 0, 0, 0, 0x80, 0, 0, 3))).toBe(4);
    expect(onesComplementSum(new Uint8Array(8))).toBe(0);
  });

  it('sums piece by piece to the same as in one go', () => {
    // More than 2^20 words, so that carries are folded in between.
    const bytes = Uint8Array.from({ length: 5 << 20 }, (_, i) => (i * 37 + 200) & 255);
    const half = 4 * 700_001;
    const pieces = onesComplementSum(bytes.subarray(half), onesComplementSum(bytes.subarray(0, half)));
    expect(onesComplementSum(bytes)).toBe(pieces);
    let exact = 0n;
    for (let i = 0; i < bytes.length; i += 4) {
      const [a, b, c, d] = bytes.subarray(i, i + 4);
      exact += BigInt(a!) * 16777216n + BigInt((b! << 16) | (c! << 8) | d!);
    }
    // Ones' complement arithmetic is arithmetic modulo 2^32 - 1.
    expect(BigInt(pieces)).toBe(exact % 4294967295n);
  });

  it('refuses bytes that are not whole words', () => {
    expect(() => onesComplementSum(new Uint8Array(6))).toThrow(RangeError);
  });
});
