import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import type { Arm } from '../../../pipeline/decode/spectrum.ts';
import { InputFault } from '../../../pipeline/errors.ts';
import {
  DEFAULT_GRID_OPTIONS,
  DEFAULT_STEP,
  NO_EXPOSURE_CONTEXT,
  toGrid,
} from '../../../pipeline/grid/index.ts';
import { rebinToLog } from '../../../pipeline/grid/log-rebin.ts';
import { spectrumOf } from '../../reference/synthetic-spectra.ts';

/** A flat arm with noise: wavelengths from `start` in steps of `pixel` Å. */
function flatArm(
  seed: number,
  { start = 4000, pixel = 1.2, length = 3000, level = 10, sigma = 1 } = {},
): Partial<Arm> & { flux: Float64Array; inverseVariance: Float64Array } {
  const random = seededRandom(seed);
  return {
    wavelengthVacuumAngstrom: Float64Array.from({ length }, (_, i) => start + pixel * i),
    flux: Float64Array.from({ length }, () => level + sigma * random.normal()),
    inverseVariance: new Float64Array(length).fill(1 / sigma ** 2),
  };
}

describe('toGrid()', () => {
  it('starts on a whole multiple of the step, so that all spectra share lags', () => {
    for (const start of [3700.3, 4000, 5123.7]) {
      const grid = toGrid(spectrumOf([flatArm(1, { start })]), NO_EXPOSURE_CONTEXT);
      const steps = grid.lnStart / grid.step;
      expect(Math.abs(steps - Math.round(steps))).toBeLessThan(1e-6);
      expect(grid.step).toBe(DEFAULT_STEP);
    }
  });

  it('uses no pixel that is not finite, has no weight, or lies in a zero-filled end', () => {
    const arm = flatArm(2);
    arm.flux[1000] = NaN;
    arm.flux[1001] = Infinity;
    arm.inverseVariance[1100] = 0;
    arm.inverseVariance[1101] = NaN;
    arm.inverseVariance[1102] = Infinity;
    arm.inverseVariance[1103] = -1;
    arm.flux.fill(0, 0, 40);
    arm.flux.fill(0, 2900);
    const grid = toGrid(spectrumOf([arm]), NO_EXPOSURE_CONTEXT);
    const { used } = grid.arms[0]!.native;
    for (const i of [1000, 1001, 1100, 1101, 1102, 1103]) expect(used[i], String(i)).toBe(0);
    const { edgePixels } = DEFAULT_GRID_OPTIONS;
    expect(used.indexOf(1)).toBe(40 + edgePixels);
    expect(used.lastIndexOf(1)).toBe(2899 - edgePixels);
    expect(grid.joined.flux.every(Number.isFinite)).toBe(true);
    expect(grid.arms[0]!.native.inverseVariance.every((w, i) => w > 0 === (used[i] === 1))).toBe(true);
  });

  it('masks sky lines where they are in the observatory’s frame, on a corrected axis too', () => {
    // +30 km/s moves the [O I] line at 5578.89 Å by 0.56 Å; pixels of 0.2 Å resolve that.
    const arm = flatArm(3, { start: 5500, pixel: 0.2, length: 1000 });
    const masked = (correction: number | null): { from: number; to: number } => {
      const { native } = toGrid(spectrumOf([arm], correction), NO_EXPOSURE_CONTEXT).arms[0]!;
      const inside = [...native.used.keys()].filter((i) => native.used[i] === 0 && i > 50 && i < 950);
      const wavelength = native.wavelengthVacuumAngstrom;
      return { from: wavelength[inside[0]!]!, to: wavelength[inside.at(-1)!]! };
    };
    const { wavelengthVacuumAngstrom: line, halfWidthAngstrom: half } = DEFAULT_GRID_OPTIONS.skyLines[0]!;
    for (const correction of [null, 30, -30]) {
      const centre = line * (1 + (correction ?? 0) / 299792.458);
      const { from, to } = masked(correction);
      expect(Math.abs(from - (centre - half))).toBeLessThan(0.2);
      expect(Math.abs(to - (centre + half))).toBeLessThan(0.2);
    }
  });

  it('lets a faint object keep the atmosphere’s bands and a bright one lose them', () => {
    const weightInBand = (level: number): number => {
      const arm = flatArm(4, { start: 7000, length: 1200, level });
      const { native } = toGrid(spectrumOf([arm]), NO_EXPOSURE_CONTEXT).arms[0]!;
      const at = native.wavelengthVacuumAngstrom.findIndex((w) => w > 7650);
      return native.inverseVariance[at]! / native.inverseVariance[at + 200]!;
    };
    // Oxygen A band, 30 per cent of the level: signal-to-noise 0.5 loses 2 per cent of its weight, 100 all but 1e-3.
    expect(weightInBand(0.5)).toBeGreaterThan(0.9);
    expect(weightInBand(100)).toBeLessThan(2e-3);
  });

  it('brings arms to one level where they overlap and tells the factor', () => {
    const blue = flatArm(5, { start: 4000, length: 1500, level: 10 });
    const red = flatArm(6, { start: 5600, length: 1500, level: 7, sigma: 0.7 });
    const grid = toGrid(spectrumOf([blue, red]), NO_EXPOSURE_CONTEXT);
    expect(grid.arms.map((arm) => arm.armIndex)).toEqual([0, 1]);
    expect(grid.arms[0]!.scale).toBe(1);
    // 165 pixels at signal-to-noise 10 in both arms: the ratio is known to 1.1 per cent.
    expect(Math.abs(grid.arms[1]!.scale / (10 / 7) - 1)).toBeLessThan(0.033);
    // Weights follow the scale, so that signal-to-noise does not change.
    const context = { noiseFactor: 1, noiseCorrelation: null, spectraUsed: 9 };
    const both = toGrid(spectrumOf([blue, red]), context).arms[1]!;
    const alone = toGrid(spectrumOf([red]), context).arms[0]!;
    expect(both.weight[800]! * both.scale ** 2).toBeCloseTo(alone.weight[800]!, 12);
    expect(both.flux[800]! / both.scale).toBeCloseTo(alone.flux[800]!, 12);
  });

  it('leaves arms alone that do not overlap or are too faint to compare', () => {
    const apart = toGrid(
      spectrumOf([flatArm(7, { length: 1000 }), flatArm(8, { start: 7000, length: 1000, level: 3 })]),
      NO_EXPOSURE_CONTEXT,
    );
    expect(apart.arms[1]!.scale).toBe(1);
    const faint = toGrid(
      spectrumOf([
        flatArm(9, { length: 1500, level: 0.1 }),
        flatArm(10, { start: 5600, length: 1000, level: 0.3 }),
      ]),
      NO_EXPOSURE_CONTEXT,
    );
    expect(faint.arms[1]!.scale).toBe(1);
  });

  it('counts signal-to-noise per ångström, and the used part of the pixels', () => {
    const grid = toGrid(spectrumOf([flatArm(11, { level: 10, pixel: 1.2 })]), NO_EXPOSURE_CONTEXT);
    // 10 per pixel of 1.2 Å is 10 / √1.2 per Å; the median of a level known to 2 per cent, twice over.
    expect(Math.abs(grid.signalToNoisePerAngstrom / (10 / Math.sqrt(1.2)) - 1)).toBeLessThan(0.05);
    const used = grid.arms[0]!.native.used.reduce((n, u) => n + u, 0);
    expect(grid.goodFraction).toBe(used / 3000);
  });

  it('refuses spectra without enough pixels, and says which', () => {
    const code = (arm: Partial<Arm>): string | null => {
      try {
        toGrid(spectrumOf([arm]), NO_EXPOSURE_CONTEXT);
        return null;
      } catch (error) {
        return error instanceof InputFault ? error.code : String(error);
      }
    };
    expect(code({ ...flatArm(12), flux: new Float64Array(3000).fill(NaN) })).toBe('no-usable-pixels');
    expect(code({ ...flatArm(12), flux: new Float64Array(3000) })).toBe('no-usable-pixels');
    expect(code(flatArm(12, { length: 60 }))).toBe('too-few-pixels');
    expect(
      code({
        wavelengthVacuumAngstrom: Float64Array.of(5000),
        flux: Float64Array.of(1),
        inverseVariance: Float64Array.of(1),
      }),
    ).toBe('no-usable-pixels');
  });

  it('says that errors are an estimate when one arm’s are', () => {
    const arms = [flatArm(13, { length: 1000 }), { ...flatArm(14, { start: 6000, length: 1000 }) }];
    const source = (second: Arm['noiseSource']): string =>
      toGrid(spectrumOf([arms[0]!, { ...arms[1]!, noiseSource: second }]), NO_EXPOSURE_CONTEXT).noiseSource;
    expect(source('stated')).toBe('stated');
    expect(source('estimated')).toBe('estimated');
  });
});

describe('rebinToLog()', () => {
  it('conserves flux to 1e-12 of the sum, and the sum of the weights', () => {
    const random = seededRandom(15);
    const length = 2000;
    const wavelength = Float64Array.from({ length }, (_, i) => 3800 + 0.9 * i + 1e-4 * i * i);
    // Light only well inside, so that the pixels cut at the ends hold none.
    const flux = Float64Array.from({ length }, (_, i) => (i > 20 && i < 1980 ? 5 + random.normal() : 0));
    const inverseVariance = Float64Array.from({ length }, (_, i) =>
      i > 20 && i < 1980 ? random.uniform() + 0.1 : 1e-30,
    );
    const { firstStep, flux: out, weight } = rebinToLog(wavelength, flux, inverseVariance, DEFAULT_STEP);
    let before = 0;
    for (let i = 0; i < length; i++) {
      before += flux[i]! * 0.5 * ((wavelength[i + 1] ?? 0) - (wavelength[i - 1] ?? 0));
    }
    let after = 0;
    out.forEach((f, j) => {
      const edge = (k: number): number => Math.exp((firstStep + k - 0.5) * DEFAULT_STEP);
      after += f * (edge(j + 1) - edge(j));
    });
    expect(Math.abs(after / before - 1)).toBeLessThan(1e-12);
    const sum = (x: Float64Array): number => x.reduce((total, v) => total + v, 0);
    expect(Math.abs(sum(weight) / sum(inverseVariance) - 1)).toBeLessThan(1e-12);
  });

  it('takes nothing from masked pixels, and drops new pixels that are mostly masked', () => {
    const wavelength = Float64Array.from({ length: 100 }, (_, i) => 5000 + i);
    const flux = new Float64Array(100).fill(2);
    flux[50] = NaN;
    const inverseVariance = new Float64Array(100).fill(4);
    inverseVariance[50] = 0;
    const { flux: out, weight, firstStep } = rebinToLog(wavelength, flux, inverseVariance, DEFAULT_STEP);
    const holding = Math.round(Math.log(5050) / DEFAULT_STEP) - firstStep;
    expect(weight[holding]).toBe(0);
    out.forEach((f, j) => {
      if (weight[j]! > 0) expect(f).toBeCloseTo(2, 12);
      else expect(f).toBe(0);
    });
  });
});
