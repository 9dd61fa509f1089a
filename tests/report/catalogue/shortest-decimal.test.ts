import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shortestDecimal } from '../../../report/catalogue/shortest-decimal.ts';

describe('shortestDecimal()', () => {
  it('reads back to the same 32-bit float, and no shorter one does', () => {
    fc.assert(
      fc.property(fc.float({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const text = shortestDecimal(value, 'float');
        expect(Math.fround(Number(text))).toBe(value === 0 ? 0 : value);
        const digits = text
          .replace(/e.*$/, '')
          .replace(/[^0-9]/g, '')
          .replace(/^0+|0+$/g, '').length;
        if (digits > 1) expect(Math.fround(Number(value.toPrecision(digits - 1)))).not.toBe(value);
      }),
      { seed: 20310402 },
    );
  });

  it('reads back to the same double', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(Number(shortestDecimal(value, 'double'))).toBe(value === 0 ? 0 : value);
      }),
      { seed: 20310402 },
    );
  });

  it('writes 0.1 as 0.1 at both widths', () => {
    expect(shortestDecimal(Math.fround(0.1), 'float')).toBe('0.1');
    expect(shortestDecimal(0.1, 'double')).toBe('0.1');
  });
});
