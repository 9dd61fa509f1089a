import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { findSpikes, steepestEdge } from '../../../pipeline/grid/spikes.ts';

const N = 600;
const noise = (seed: number): Float64Array => {
  const random = seededRandom(seed);
  return Float64Array.from({ length: N }, () => 20 + random.normal());
};
const weights = new Float64Array(N).fill(1);

/** Adds a Gaussian line, integrated over pixels by 20 samples each. */
function addLine(flux: Float64Array, centre: number, sigma: number, height: number): void {
  for (let i = 0; i < N; i++) {
    for (let k = 0; k < 20; k++) {
      const x = i - 0.475 + k / 20;
      flux[i]! += (height / 20) * Math.exp(-0.5 * ((x - centre) / sigma) ** 2);
    }
  }
}

describe('findSpikes()', () => {
  it.each([
    [1, 20],
    [2, 20],
    [2, 40],
    [3, 30],
    [5, 20],
    [5, 40],
  ])(
    'finds a cosmic ray %i pixels wide, %i sigma high, and its neighbours, and nothing else',
    (width, height) => {
      let found = 0;
      for (let seed = 0; seed < 40; seed++) {
        const flux = noise(100 + seed);
        for (let i = 0; i < width; i++) flux[300 + i]! += height;
        const pixels = findSpikes(flux, weights, null);
        if (pixels.length === 0) continue;
        found++;
        expect(pixels).toEqual(Array.from({ length: width + 2 }, (_, i) => 299 + i));
      }
      // At 20 sigma the noise of an edge (1.4 sigma) now and then makes it as shallow as a line's.
      expect(found).toBeGreaterThanOrEqual(height >= 30 ? 40 : 36);
    },
  );

  it('finds a dead pixel, which stands below its surroundings', () => {
    const flux = noise(1);
    flux[200] = 0;
    expect(findSpikes(flux, weights, null)).toEqual([199, 200, 201]);
  });

  it.each([0.9, 1.2, 2, 4])(
    'keeps every emission line of sigma %d pixels, 10 to 1,000 sigma high, wherever it falls',
    (sigma) => {
      const random = seededRandom(Math.round(100 * sigma));
      for (let trial = 0; trial < 200; trial++) {
        const flux = noise(1000 + trial);
        addLine(flux, 100 + 400 * random.uniform(), sigma, 10 ** (1 + 2 * random.uniform()));
        expect(findSpikes(flux, weights, null), `trial ${trial}`).toEqual([]);
        expect(
          findSpikes(flux, weights, () => sigma),
          `trial ${trial}`,
        ).toEqual([]);
      }
    },
  );

  it('keeps absorption lines down to zero flux', () => {
    for (let trial = 0; trial < 50; trial++) {
      const flux = noise(2000 + trial);
      addLine(flux, 300 + trial / 50, 1.1, -20);
      expect(findSpikes(flux, weights, null)).toEqual([]);
    }
  });

  it('takes a spike the line spread cannot make, and keeps it where the line spread is not known to be wider', () => {
    const flux = noise(3);
    // Two pixels, the outer ones at 0.35: too sharp for sigma 2, possible for sigma 0.9.
    [0.35, 1, 1, 0.35].forEach((v, i) => {
      flux[300 + i]! += 60 * v;
    });
    expect(findSpikes(flux, weights, () => 2)).toContain(301);
    expect(findSpikes(flux, weights, null)).toEqual([]);
  });

  it('finds nothing in noise, with gaps', () => {
    const flux = noise(4);
    const gaps = weights.map((w, i) => (i % 50 === 0 ? 0 : w));
    flux[100] = NaN;
    expect(findSpikes(flux, gaps, null)).toEqual([]);
  });
});

describe('steepestEdge()', () => {
  it('falls as the line spread grows, towards exp(−1/2) / sigma', () => {
    const edges = [0.5, 0.85, 1.5, 3, 6].map(steepestEdge);
    expect(edges).toEqual([...edges].sort((a, b) => b - a));
    // The steepest slope of a unit Gaussian is exp(−1/2) / sigma at 1 sigma.
    expect(Math.abs(steepestEdge(6) / (Math.exp(-0.5) / 6) - 1)).toBeLessThan(0.02);
  });
});
