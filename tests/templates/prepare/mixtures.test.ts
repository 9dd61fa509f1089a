import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { squaredDistanceToCone } from '../../../templates/prepare/cone.ts';
import { gramOf } from '../../../templates/prepare/gram-of.ts';
import { principalVectors } from '../../../templates/prepare/principal-vectors.ts';
import { neededForMixtures } from '../../../templates/prepare/prune.ts';
import { rootMeanSquare } from '../../../templates/prepare/unit-rows.ts';

const SEED = 20310402;

/** Positive spectra with structure, so that they are far from parallel. */
function randomSpectra(count: number, length: number): Float32Array[] {
  const random = seededRandom(SEED);
  return Array.from({ length: count }, () => Float32Array.from({ length }, () => random.uniform() ** 3));
}

const mix = (rows: readonly Float32Array[], amplitudes: readonly number[]): Float32Array =>
  rows[0]!.map((_, i) => rows.reduce((sum, row, k) => sum + amplitudes[k]! * row[i]!, 0));

describe('gramOf()', () => {
  it.each([1, 4, 7])('of %i rows equals the plain sums', (count) => {
    const rows = randomSpectra(count, 33);
    const gram = gramOf(rows);
    rows.forEach((a, j) => {
      rows.forEach((b, k) => {
        const sum = a.reduce((total, value, i) => total + value * b[i]!, 0);
        expect(gram[j * count + k]).toBeCloseTo(sum, 4);
      });
    });
  });
});

describe('principalVectors()', () => {
  it('spans spectra of rank three with three vectors, leaving nothing', () => {
    const basis = randomSpectra(3, 200);
    const random = seededRandom(SEED + 1);
    const rows = Array.from({ length: 12 }, () =>
      mix(basis, [random.uniform(), random.uniform(), random.uniform()]),
    );
    const vectors = principalVectors(rows, 5);
    expect(vectors.length).toBe(3);
    for (const row of rows) {
      const left = row.slice();
      for (const vector of vectors) {
        const amplitude = left.reduce((sum, value, i) => sum + value * vector[i]!, 0) / 200;
        vector.forEach((value, i) => {
          left[i]! -= amplitude * value;
        });
      }
      expect(rootMeanSquare(left) / rootMeanSquare(row)).toBeLessThan(1e-5);
    }
  });

  it('returns unit-rms rows with a mean that is not negative, orthogonal to each other', () => {
    const vectors = principalVectors(randomSpectra(9, 100), 4);
    vectors.forEach((vector, j) => {
      expect(rootMeanSquare(vector)).toBeCloseTo(1, 5);
      expect(vector.reduce((sum, value) => sum + value, 0)).toBeGreaterThanOrEqual(0);
      vectors.slice(j + 1).forEach((other) => {
        expect(Math.abs(vector.reduce((sum, value, i) => sum + value * other[i]!, 0)) / 100).toBeLessThan(
          1e-4,
        );
      });
    });
  });

  it('ignores pixels of weight zero when it chooses', () => {
    const rows = [Float32Array.of(1, 1, 9), Float32Array.of(1, 1, -9)];
    const [first] = principalVectors(rows, 1, Float64Array.of(1, 1, 0));
    expect(first![0]).toBeCloseTo(first![1]!, 6);
    expect(Math.abs(first![2]!)).toBeLessThan(1e-5);
  });

  it('refuses an empty set', () => {
    expect(() => principalVectors([], 2)).toThrow(RangeError);
  });
});

describe('squaredDistanceToCone()', () => {
  it('equals the least distance over a fine grid of non-negative mixtures', () => {
    const [a, b, target] = randomSpectra(3, 40) as [Float32Array, Float32Array, Float32Array];
    const gram = gramOf([a, b, target]);
    let least = Infinity;
    for (let x = 0; x <= 2; x += 0.005) {
      for (let y = 0; y <= 2; y += 0.005) {
        let sum = 0;
        for (let i = 0; i < 40; i++) sum += (target[i]! - x * a[i]! - y * b[i]!) ** 2;
        least = Math.min(least, sum);
      }
    }
    expect(Math.abs(squaredDistanceToCone(gram, 3, 2, [0, 1]) - least)).toBeLessThan(1e-3);
  });

  it('is zero for a mixture and the whole length for the opposite of a member', () => {
    const rows = randomSpectra(2, 40);
    const all = [...rows, mix(rows, [0.3, 2]), rows[0]!.map((value) => -value)];
    const gram = gramOf(all);
    expect(squaredDistanceToCone(gram, 4, 2, [0, 1]) / gram[10]!).toBeLessThan(1e-6);
    expect(squaredDistanceToCone(gram, 4, 3, [0])).toBeCloseTo(gram[15]!, 6);
  });
});

describe('neededForMixtures()', () => {
  it('keeps the ends and drops what they make: three of nine mixtures', () => {
    const ends = randomSpectra(3, 120);
    const random = seededRandom(SEED + 2);
    const inside = Array.from({ length: 6 }, () =>
      mix(ends, [random.uniform() + 0.1, random.uniform() + 0.1, random.uniform() + 0.1]),
    );
    expect(neededForMixtures([...inside, ...ends], 1e-3)).toEqual([6, 7, 8]);
  });

  it('keeps all when none is a mixture of the others, one when all are the same', () => {
    expect(neededForMixtures(randomSpectra(4, 50), 0.01)).toEqual([0, 1, 2, 3]);
    const same = randomSpectra(1, 50)[0]!;
    expect(neededForMixtures([same, same.slice(), same.slice()], 0.01).length).toBe(1);
  });
});
