import { describe, expect, it } from 'vitest';
import { combineMasks } from '../../../pipeline/decode/combine-masks.ts';

const WEIGHTY = new Uint8Array(10).fill(1);
const mask = (...values: number[]): Float64Array => Float64Array.from(values);

describe('combineMasks', () => {
  it('joins masks that flag different pixels', () => {
    const { bad } = combineMasks(
      [mask(4, 0, 0, 0, 0, 0, 0, 0, 0, 0), mask(0, 8, 0, 0, 0, 0, 0, 0, 0, 0)],
      'nonzero',
      WEIGHTY,
    );
    expect([...bad]).toEqual([1, 1, 0, 0, 0, 0, 0, 0, 0, 0]);
  });

  it('uses the narrow one of two masks that lie inside each other, and says so', () => {
    const narrow = mask(0, 2, 0, 0, 0, 0, 0, 0, 0, 0);
    const wide = mask(2, 2, 2, 2, 0, 0, 0, 0, 0, 0);
    const { bad, notes } = combineMasks([wide, narrow], 'nonzero', WEIGHTY);
    expect([...bad]).toEqual([0, 1, 0, 0, 0, 0, 0, 0, 0, 0]);
    expect(notes).toEqual(['mask 1 of 2 contains another and was not used']);
  });

  it('keeps both of two equal masks', () => {
    const equal = mask(0, 2, 0, 0, 0, 0, 0, 0, 0, 0);
    expect(combineMasks([equal, equal], 'nonzero', WEIGHTY).bad[1]).toBe(1);
  });

  it('ignores a bit set over most of the spectrum but keeps the others of the same pixels', () => {
    const { bad, notes } = combineMasks([mask(4, 4, 4, 4, 4, 4, 4, 6, 0, 0)], 'nonzero', WEIGHTY);
    expect([...bad]).toEqual([0, 0, 0, 0, 0, 0, 0, 1, 0, 0]);
    expect(notes).toEqual(['mask bit 2 is set over 80 % of the pixels and was ignored']);
  });

  it('ignores a bit over a fifth of the spectrum: what is broken would have no weight', () => {
    const { bad, notes } = combineMasks([mask(16, 16, 0, 0, 0, 0, 0, 0, 0, 0)], 'nonzero', WEIGHTY);
    expect([...bad]).toEqual(new Array(10).fill(0));
    expect(notes).toEqual(['mask bit 4 is set over 20 % of the pixels and was ignored']);
  });

  it('believes a flag of zeros and ones however much it covers', () => {
    const { bad } = combineMasks([mask(1, 1, 1, 1, 1, 1, 1, 0, 0, 0)], 'nonzero', WEIGHTY);
    expect([...bad]).toEqual([1, 1, 1, 1, 1, 1, 1, 0, 0, 0]);
  });

  it('turns round a mask whose zeros are bad', () => {
    expect([...combineMasks([mask(1, 1, 0, 1, 1, 1, 1, 1, 1, 1)], 'zero', WEIGHTY).bad]).toEqual([
      0, 0, 1, 0, 0, 0, 0, 0, 0, 0,
    ]);
  });

  it('tells bits beyond the 31st apart', () => {
    const high = 2 ** 40;
    const { bad } = combineMasks(
      [mask(high, high, high, high, high, high, high + 1, 0, 0, 0)],
      'nonzero',
      WEIGHTY,
    );
    expect([...bad]).toEqual([0, 0, 0, 0, 0, 0, 1, 0, 0, 0]);
  });
});
