import { describe, expect, it } from 'vitest';
import { cardText } from '../../../pipeline/encode/card-text.ts';

/** The fixed format of FITS 4.0, section 4.2: columns are counted from 1. */
describe('cardText', () => {
  it('ends numbers and logicals in column 30', () => {
    for (const value of [12, -0.5, true, 9007199254740993n]) {
      const [card] = cardText({ keyword: 'KEY', value, comment: 'why' });
      expect(card).toHaveLength(80);
      expect(card!.slice(0, 10)).toBe('KEY     = ');
      expect(card!.slice(30)).toBe(' / why'.padEnd(50));
      expect(card![29]).not.toBe(' ');
    }
  });

  it.each([
    [0.1, '0.1'],
    [1e-7, '1E-7'],
    [-1.2345678901234567e-300, '-1.2345678901234568E-300'],
    [1e21, '1E21'],
    [2 ** 60, '1152921504606847000.'],
    [null, ''],
  ])('writes %s as a number of FITS', (value, text) => {
    expect(cardText({ keyword: 'KEY', value })[0]!.slice(10).trim()).toBe(text);
  });

  it('begins strings in column 11, eight characters at least, quotes doubled', () => {
    expect(cardText({ keyword: 'A', value: 'ab' })[0]!.trimEnd()).toBe("A       = 'ab      '");
    expect(cardText({ keyword: 'A', value: "it's" })[0]!.trimEnd()).toBe("A       = 'it''s   '");
    expect(cardText({ keyword: 'A', value: '' })[0]!.trimEnd()).toBe("A       = '        '");
  });

  it('fits 68 characters in one card and continues from 69 on', () => {
    expect(cardText({ keyword: 'A', value: 'x'.repeat(68) })).toHaveLength(1);
    const [first, second] = cardText({ keyword: 'A', value: 'x'.repeat(69) });
    expect(first).toBe(`A       = '${'x'.repeat(67)}&'`.padEnd(80));
    expect(second).toBe("CONTINUE  'xx'".padEnd(80));
  });

  it('never tears a doubled quote apart', () => {
    for (const card of cardText({ keyword: 'A', value: `${'x'.repeat(66)}'${'y'.repeat(66)}'''''''z` })) {
      const inside = card.slice(11, card.lastIndexOf("'")).replace(/&$/, '');
      expect(inside.replaceAll("''", '')).not.toContain("'");
    }
  });

  it('breaks commentary over cards and cuts a comment that does not fit', () => {
    const history = cardText({ keyword: 'HISTORY', text: 'a'.repeat(73) });
    expect(history).toEqual([`HISTORY ${'a'.repeat(72)}`, 'HISTORY a'.padEnd(80)]);
    expect(cardText({ keyword: 'COMMENT', text: '' })).toEqual(['COMMENT'.padEnd(80)]);
    expect(cardText({ keyword: 'A', value: 1, comment: 'c'.repeat(90) })[0]).toHaveLength(80);
  });

  it.each([
    ['a lower-case keyword', { keyword: 'key', value: 1 }],
    ['a keyword of nine letters', { keyword: 'KEYWORDXX', value: 1 }],
    ['NaN', { keyword: 'KEY', value: NaN }],
    ['an infinite number', { keyword: 'KEY', value: -Infinity }],
    ['a letter outside ASCII', { keyword: 'KEY', value: 'caf\u00e9' }],
    ['a line break in a comment', { keyword: 'KEY', value: 1, comment: 'a\nb' }],
  ])('refuses %s', (_, card) => {
    expect(() => cardText(card)).toThrow(RangeError);
  });
});
