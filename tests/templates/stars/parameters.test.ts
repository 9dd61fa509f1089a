import { describe, expect, it } from 'vitest';
import { STAR_GRID, starNamed } from '../../../templates/stars/parameters.ts';

describe('STAR_GRID', () => {
  it('holds 116 stars with distinct names', () => {
    expect(STAR_GRID).toHaveLength(116);
    expect(new Set(STAR_GRID.map(({ name }) => name)).size).toBe(116);
  });

  it('keeps gravity falling along the giant branch and below that of dwarfs', () => {
    const giants = STAR_GRID.filter(({ group, metallicity }) => group === 'giant' && metallicity === 0);
    for (const [i, giant] of giants.entries()) {
      expect(giant.logGravity).toBeLessThan(4.2);
      expect(giant.logGravity).toBeGreaterThan(giants[i - 1]?.logGravity ?? 0);
    }
  });
});

describe('starNamed', () => {
  it('finds the Sun, and refuses a name that is not in the grid', () => {
    expect(starNamed('dwarf 5777 4.5 +0.0').effectiveTemperature).toBe(5777);
    expect(() => starNamed('dwarf 5778 4.5 +0.0')).toThrow(RangeError);
  });
});
