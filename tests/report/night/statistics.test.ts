import { describe, expect, it } from 'vitest';
import { histogram } from '../../../report/night/histogram.ts';
import { binomialTail, proportion } from '../../../report/night/proportion.ts';

describe('histogram()', () => {
  it('counts both ends and nothing outside', () => {
    expect(histogram([-0.1, 0, 0.49, 0.5, 1, 1.1, NaN], 0, 1, 2).counts).toEqual([2, 2]);
  });

  it('refuses an empty or endless range', () => {
    expect(() => histogram([1], 1, 1, 2)).toThrow(RangeError);
    expect(() => histogram([1], 0, Infinity, 2)).toThrow(RangeError);
  });
});

describe('proportion()', () => {
  it('has the Wilson interval of Newcombe (1998, Stat. Med. 17, 857, table I, from memory): 81 of 263', () => {
    const { low, high } = proportion(81, 263, 1.959964);
    expect(low).toBeCloseTo(0.2553, 4);
    expect(high).toBeCloseTo(0.3662, 4);
  });

  it('has the Wilson interval of the same table where the normal one has no width: 0 of 20', () => {
    const { low, high } = proportion(0, 20, 1.959964);
    expect(low).toBe(0);
    expect(high).toBeCloseTo(0.1611, 4);
  });

  it('says that nothing is known when nothing was tried', () => {
    expect(proportion(0, 0)).toEqual({ hits: 0, of: 0, share: null, low: 0, high: 1 });
  });
});

describe('binomialTail()', () => {
  it('is the upper tail of tossing a fair coin ten times', () => {
    // 1/1024 · (C(10,8) + C(10,9) + C(10,10)) = 56/1024
    expect(binomialTail(8, 10, 0.5)).toBeCloseTo(56 / 1024, 14);
  });

  it('is certain for no hits and has its limits at chances of 0 and 1', () => {
    expect(binomialTail(0, 10, 0.1)).toBe(1);
    expect(binomialTail(1, 10, 0)).toBe(0);
    expect(binomialTail(10, 10, 1)).toBe(1);
  });
});
