import { describe, expect, it } from 'vitest';
import { buildHeader, integerCard, numberCard, textCard } from '../../../../pipeline/decode/fits/header.ts';
import { faultOf } from '../../../support/fault-of.ts';

const PLACE = { file: 'made.fits', hdu: 2 };

describe('buildHeader', () => {
  it('keeps the first of two cards with one keyword', () => {
    const header = buildHeader(['A       = 1', "A       = 'again&'", "CONTINUE  'and on'", 'B       = 2']);
    expect([header.get('A'), header.get('B')]).toEqual([1, 2]);
    expect(header.keys()).toEqual(['A', 'B']);
  });

  it('joins continued strings and keeps an ampersand that nothing continues', () => {
    const header = buildHeader([
      "LONG    = 'one, &' / first",
      "CONTINUE  'two''s, &'",
      "CONTINUE  'three&' / last",
      "PLAIN   = 'this & that &'",
    ]);
    expect(header.get('LONG')).toBe("one, two's, three&");
    expect(header.get('PLAIN')).toBe('this & that &');
  });

  it('takes a CONTINUE card that continues nothing for a comment', () => {
    const header = buildHeader(['A       = 1', "CONTINUE  'lost'"]);
    expect(header.get('A')).toBe(1);
    expect(header.comments).toEqual(['lost']);
  });

  it('finds keywords in either case, HIERARCH ones with and without that word', () => {
    const header = buildHeader(['HIERARCH Eso Det Gain = 3', 'Exptime = 9.5']);
    expect(header.get('ESO DET GAIN')).toBe(3);
    expect(header.get('hierarch eso det gain')).toBe(3);
    expect(header.get('EXPTIME')).toBe(9.5);
    expect(header.get('ABSENT')).toBeUndefined();
  });

  it('tells an undefined value from an absent keyword', () => {
    const header = buildHeader(['A       =                      / no value yet']);
    expect(header.get('A')).toBeNull();
    expect(header.keys()).toEqual(['A']);
  });

  it('keeps COMMENT, HISTORY and blank-keyword texts in file order', () => {
    const header = buildHeader(['COMMENT one', 'HISTORY two', '        three', '']);
    expect(header.comments.map((text) => text.trim())).toEqual(['one', 'two', 'three']);
  });
});

describe('typed cards', () => {
  const header = buildHeader([
    "T       = ' text '",
    'N       = 1.5',
    'U       =',
    "BAD     = 'open",
    'I       = 4',
  ]);

  it('gives the value, or the fallback for absent and undefined ones', () => {
    expect(textCard(header, 'T', PLACE)).toBe('text');
    expect(textCard(header, 'NONE', PLACE)).toBe('');
    expect(numberCard(header, 'N', PLACE)).toBe(1.5);
    expect(numberCard(header, 'U', PLACE, 7)).toBe(7);
    expect(integerCard(header, 'I', PLACE)).toBe(4);
  });

  it.each([
    ['a malformed value', () => numberCard(header, 'BAD', PLACE, 1), 'BAD'],
    ['a fraction for an integer', () => integerCard(header, 'N', PLACE), 'N must be an integer'],
    ['a string for a number', () => numberCard(header, 'T', PLACE), 'T must be a number'],
    ['a number for a string', () => textCard(header, 'N', PLACE), 'N must be a string'],
    [
      'a missing mandatory card',
      () => integerCard(header, 'NAXIS', PLACE),
      'NAXIS must be a number, got no card',
    ],
  ])('refuses %s and names the card', (_, action, words) => {
    const fault = faultOf(action);
    expect(fault.code).toBe('fits-bad-header');
    expect(fault.message).toContain(words);
    expect(fault.place).toEqual(PLACE);
  });
});
