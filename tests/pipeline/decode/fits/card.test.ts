import { describe, expect, it } from 'vitest';
import { isEndCard, parseCard } from '../../../../pipeline/decode/fits/card.ts';

/** Cards as FITS 4.0, section 4, prescribes or allows them. */
describe('parseCard', () => {
  const value = (card: string): unknown => {
    const parsed = parseCard(card.padEnd(80));
    if (parsed.kind === 'text') return parsed.text.trimEnd();
    return parsed.kind === 'value' ? parsed.value : parsed.kind;
  };

  it.each([
    ["UNIT    = 'erg/s/cm2/A' / flux unit", 'erg/s/cm2/A'],
    ["FILE    = '/data/raw/a.fits'", '/data/raw/a.fits'],
    ["NOTE    = 'it''s' / isn't it", "it's"],
    ["NOTE    = ''''", "'"],
    ["EMPTY   = ''", ''],
    ["BLANKS  = '        ' / nothing", ''],
    ["LEAD    = '  two blanks first  '", '  two blanks first'],
  ])('reads the string of %s', (card, expected) => {
    expect(value(card)).toBe(expected);
  });

  it.each([
    ['A       =                   12 / twelve', 12],
    ['A       = +7', 7],
    ['A       = -0005', -5],
    ['A       = 1.5E-3', 0.0015],
    ['A       = 1.5D-3 / Fortran double', 0.0015],
    ['A       = 2d2', 200],
    ['A       = .5', 0.5],
    ['A       = 5.', 5],
    ['A       = 9007199254740991', 9007199254740991],
    ['A       = 9007199254740993', 9007199254740993n],
    ['A       = +18446744073709551615', 18446744073709551615n],
    ['A       =                    T', true],
    ['A       =                    F / no', false],
    ['A       =                      / no value', null],
    ['A       = (1.0, -2.0) / complex', '(1.0, -2.0)'],
  ])('reads the value of %s', (card, expected) => {
    expect(value(card)).toBe(expected);
  });

  it.each([
    ["A       = 'never closed"],
    ["A       = 'two' 'strings'"],
    ["A       = 'it's undoubled'"],
    ['A       = 12 13'],
    ['A       = NaN'],
    ['A       = 1E999'],
    ['A       = true'],
  ])('calls the value of %s malformed', (card) => {
    expect(value(card)).toBe('malformed');
  });

  it('joins the words of a HIERARCH keyword with single blanks', () => {
    expect(parseCard('HIERARCH ESO DET  CHIP1 GAIN = 1.25 / e-/ADU')).toEqual({
      kind: 'value',
      keyword: 'ESO DET CHIP1 GAIN',
      value: 1.25,
    });
  });

  it('keeps commentary as text, whatever it looks like', () => {
    expect(parseCard("COMMENT = 'not a value'")).toEqual({ kind: 'comment', text: "= 'not a value'" });
    expect(parseCard('HISTORY made by hand')).toEqual({ kind: 'comment', text: 'made by hand' });
    expect(parseCard('NOVALUE   text without the value indicator').kind).toBe('comment');
  });

  it('takes END for the end only when it stands alone', () => {
    expect(isEndCard('END'.padEnd(80))).toBe(true);
    for (const card of ['ENDTIME = 5', 'ENDMJD  = 1', 'END     = 3', 'END of text']) {
      expect(isEndCard(card.padEnd(80))).toBe(false);
    }
  });
});
