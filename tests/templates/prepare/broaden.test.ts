import { describe, expect, it } from 'vitest';
import { broaden, gaussianKernel, missingWidthKmS } from '../../../templates/prepare/broaden.ts';

const widthOf = (flux: Float32Array, centre: number): number => {
  let sum = 0;
  let square = 0;
  flux.forEach((value, i) => {
    sum += value;
    square += value * (i - centre) ** 2;
  });
  return Math.sqrt(square / sum);
};

describe('broaden()', () => {
  it.each([0.2, 0.6, 0.7, 1.6, 5.1, 20])('gives a spike the width asked for: %f pixels', (sigma) => {
    const spike = new Float32Array(401);
    spike[200] = 1;
    // Cutting at 4 sigma takes 5e-4 of the variance.
    expect(Math.abs(widthOf(broaden(spike, sigma), 200) / sigma - 1)).toBeLessThan(2e-3);
  });

  it('adds widths in quadrature: 3 pixels after 4 pixels is 5 pixels', () => {
    const spike = new Float32Array(401);
    spike[200] = 1;
    expect(Math.abs(widthOf(broaden(broaden(spike, 4), 3), 200) / 5 - 1)).toBeLessThan(2e-3);
  });

  it('keeps a constant constant up to the ends, and copies when the width is 0', () => {
    expect(broaden(new Float32Array(50).fill(2), 7).every((value) => Math.abs(value - 2) < 1e-6)).toBe(true);
    const flux = Float32Array.of(1, 5, 2);
    expect(broaden(flux, 0)).toEqual(flux);
  });

  it('equals direct summation within 32-bit rounding', () => {
    const flux = Float32Array.from({ length: 60 }, (_, i) => Math.sin(i * i));
    const sigma = 2.3;
    const smooth = broaden(flux, sigma);
    for (let i = 0; i < flux.length; i++) {
      let sum = 0;
      let norm = 0;
      for (let k = -10; k <= 10; k++) {
        const weight = Math.exp(-0.5 * (k / sigma) ** 2);
        sum += weight * flux[Math.min(59, Math.max(0, i + k))]!;
        norm += weight;
      }
      expect(smooth[i]).toBeCloseTo(sum / norm, 6);
    }
  });

  it('gaussianKernel() refuses a negative width', () => {
    expect(() => gaussianKernel(-1)).toThrow(RangeError);
    expect(() => gaussianKernel(NaN)).toThrow(RangeError);
  });

  it('missingWidthKmS() is what quadrature leaves, and 0 when the spectrum is wide enough', () => {
    expect(missingWidthKmS(65, 25)).toBeCloseTo(60, 12);
    expect(missingWidthKmS(20, 25)).toBe(0);
  });
});
