import { describe, expect, it } from 'vitest';
import { equilibriumDistance, franckCondon, morseState } from '../../../templates/physics/morse.ts';

const CN_LOWER = {
  we: 2068.6,
  wexe: 13.09,
  distance: equilibriumDistance(1.8997, 6.46219),
  reducedMass: 6.46219,
};
const CN_UPPER = {
  we: 2163.9,
  wexe: 20.2,
  distance: equilibriumDistance(1.973, 6.46219),
  reducedMass: 6.46219,
};
const C2_LOWER = { we: 1641.3, wexe: 11.65, distance: equilibriumDistance(1.6323, 6), reducedMass: 6 };
const C2_UPPER = { we: 1788.2, wexe: 16.46, distance: equilibriumDistance(1.7532, 6), reducedMass: 6 };

describe('equilibriumDistance', () => {
  it('of CN is 1.1718 angstrom (Huber & Herzberg 1979)', () => {
    expect(CN_LOWER.distance).toBeCloseTo(1.1718, 3);
  });
});

describe('morseState', () => {
  it('gives orthonormal states', () => {
    const grid = Float64Array.from({ length: 2000 }, (_, i) => 0.7 + i * 0.0008);
    const states = [0, 1, 2, 5].map((v) => morseState(CN_LOWER, v, grid));
    for (const [i, left] of states.entries()) {
      for (const [j, right] of states.entries()) {
        const product = left.reduce((sum, value, k) => sum + value * right[k]!, 0);
        expect(product).toBeCloseTo(i === j ? 1 : 0, 6);
      }
    }
  });

  it('is zero for a state that the potential does not bind', () => {
    const shallow = { we: 100, wexe: 20, distance: 1, reducedMass: 1 };
    expect(morseState(shallow, 3, Float64Array.of(0.9, 1, 1.1))).toEqual(new Float64Array(3));
  });
});

describe('franckCondon', () => {
  it('sums to at most 1 over the upper states, and nearly 1 from the ground state', () => {
    const [ground] = franckCondon(CN_LOWER, CN_UPPER, 7);
    const sum = ground!.reduce((total, value) => total + value, 0);
    expect(sum).toBeLessThanOrEqual(1 + 1e-9);
    expect(sum).toBeGreaterThan(0.999);
  });

  // CN violet 0.918, C2 Swan 0.72 (Danylewych & Nicholls 1974, RKR-Morse; from memory). Pure Morse potentials
  // reproduce them within 3 per cent.
  it('gives the published 0-0 factors of CN violet and C2 Swan within 3 per cent', () => {
    expect(franckCondon(CN_LOWER, CN_UPPER, 1)[0]![0]! / 0.918).toBeCloseTo(1, 1);
    expect(Math.abs(franckCondon(C2_LOWER, C2_UPPER, 1)[0]![0]! / 0.725 - 1)).toBeLessThan(0.03);
  });
});
