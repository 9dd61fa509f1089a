import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { spreadMeaningByNumbers } from '../../../pipeline/decode/spread-meaning.ts';

const PIXELS = 1500;
const random = seededRandom(51);
/** Noise that rises fourfold along the spectrum, about 1 on the whole. */
const sigma = Float64Array.from({ length: PIXELS }, (_, i) => 0.5 * 4 ** (i / PIXELS));
const flux = sigma.map((value) => 20 + value * random.normal());

describe('spreadMeaningByNumbers', () => {
  it.each([0.01, 1, 1000])('tells error, variance and inverse variance apart in units of %d', (scale) => {
    const scaled = flux.map((value) => value * scale);
    const read = (turn: (value: number) => number) =>
      spreadMeaningByNumbers(
        scaled,
        sigma.map((value) => turn(value * scale)),
      )?.meaning;
    expect(read((value) => value)).toBe('error');
    expect(read((value) => value ** -2)).toBe('inverse-variance');
    // Near 1 an error and a variance cannot be told apart, and errors are the commoner.
    expect(read((value) => value ** 2)).toBe(scale === 1 ? 'error' : 'variance');
  });

  it('does not take a continuum, or anything with negative values, for a spread', () => {
    const faint = flux.map((value) => value * 1e-4);
    expect(spreadMeaningByNumbers(faint, new Float64Array(PIXELS).fill(0.7))?.meaning).toBeUndefined();
    expect(
      spreadMeaningByNumbers(
        flux,
        flux.map((value) => value - 20),
      ),
    ).toBeNull();
  });
});
