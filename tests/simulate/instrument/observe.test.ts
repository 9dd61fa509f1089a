import { expect, it } from 'vitest';
import { maskedAutocorrelation } from '../../../pipeline/core/autocorrelation.ts';
import { robustSigma } from '../../../pipeline/core/quantile.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { CURLEW_ARMS, RESOLVING_POWER } from '../../../simulate/instrument/curlew.ts';
import type { FibreFlaws } from '../../../simulate/instrument/flaws.ts';
import { armWavelengths, lightInArm, observeArm } from '../../../simulate/instrument/observe.ts';
import { addBumps } from '../../../simulate/rest-spectrum.ts';
import type { Source } from '../../../simulate/sources/source.ts';

const [BLUE, RED] = CURLEW_ARMS as [(typeof CURLEW_ARMS)[number], (typeof CURLEW_ARMS)[number]];
const FULL_WIDTH = 2 * Math.sqrt(2 * Math.LN2);
const GRID = { lnStart: Math.log(3000), step: 1.15e-4, length: 12_000 };
const FLAWLESS: FibreFlaws = {
  armStep: 1,
  tilt: 0,
  ripple: { amplitude: 0, periodAngstrom: 200, phase: 0 },
  bandError: 0,
  spreadFactor: 1,
  skyScaleError: 0,
  skyShiftPixels: 0,
};
const DARK = { continuum: 1, hydroxyl: 1, oxygen: 1, other: 1 };

const flat = (magnitude: number, bumps: Parameters<typeof addBumps>[2] = []): Source => {
  const flux = new Float32Array(GRID.length).fill(1);
  addBumps(flux, GRID, bumps);
  return { kind: 'galaxy', redshift: 0, magnitude, spectrum: { grid: GRID, flux, sharpnessKmS: 0 } };
};

it('a flat spectrum of AB magnitude 20 has 3631 Jy × 1e-8 × c/λ² at the middle of the band', () => {
  const light = lightInArm(flat(20), RED, 1, 1);
  const wanted = (3631e-23 * 1e-8 * 2.99792458e18) / 6300 ** 2 / 1e-17;
  // Magnitude zero is 48.6 rounded from 48.6003: 3e-4.
  expect(light[500]! / wanted).toBeCloseTo(1, 3);
});

it.each([
  ['blue', BLUE, 4500, 1.02],
  ['red', RED, 6000, 1.25],
] as const)(
  'a line in the %s arm lands at rest × shift, as wide as line and instrument together',
  (_, arm, rest, shift) => {
    const lineSigmaKmS = 90;
    const withLine = lightInArm(
      flat(18, [{ wavelength: rest, sigmaKmS: lineSigmaKmS, flux: 50 }]),
      arm,
      shift,
      1,
    );
    const wavelengths = armWavelengths(arm);
    const near = [...wavelengths.keys()].filter((i) => Math.abs(wavelengths[i]! - rest * shift) < 30);
    const level = withLine[near[0]! - 50]!;
    const weight = near.map((i) => withLine[i]! - level);
    const sum = weight.reduce((total, w) => total + w, 0);
    const centre = near.reduce((total, i, k) => total + wavelengths[i]! * weight[k]!, 0) / sum;
    const variance =
      near.reduce((total, i, k) => total + (wavelengths[i]! - centre) ** 2 * weight[k]!, 0) / sum;
    // The Doppler stretch of a symmetric profile in ln λ moves its mean by σ²λ/2: 1e-3 Å here.
    expect(Math.abs(centre - rest * shift)).toBeLessThan(0.005);
    const instrument = (rest * shift) / RESOLVING_POWER / FULL_WIDTH;
    const line = (rest * shift * lineSigmaKmS) / 299_792.458;
    const pixel = arm.stepAngstrom / Math.sqrt(12);
    const wanted = instrument ** 2 + line ** 2 + pixel ** 2;
    // The kernel is cut at 4 sigma and the grid adds its own pixel of 0.5 Å.
    expect(Math.sqrt(variance / wanted)).toBeCloseTo(1, 2);
  },
);

it('stated errors are 7 per cent too small and neighbours alike, as the reduction it imitates leaves them', () => {
  const pulls: number[] = [];
  for (let seed = 1; seed <= 40; seed++) {
    const row = observeArm(seededRandom(seed), BLUE, new Float64Array(BLUE.pixels), {
      exposureS: 1800,
      airmass: 1.2,
      sky: DARK,
      flaws: FLAWLESS,
    });
    for (let i = 300; i < 1200; i++) pulls.push(row.quality[i] === 0 ? row.flux[i]! / row.error[i]! : NaN);
  }
  const good = pulls.filter((pull) => Number.isFinite(pull));
  // 36,000 pulls: the robust sigma is good to 1.17 / sqrt(2 N) = 0.44 per cent, four times that here.
  expect(Math.abs(robustSigma(good) * 0.93 - 1)).toBeLessThan(0.018);
  const used = Uint8Array.from(pulls, (pull) => (Math.abs(pull) < 5 ? 1 : 0));
  const [lag1] = maskedAutocorrelation(
    Float64Array.from(pulls, (p) => (Math.abs(p) < 5 ? p : 0)),
    used,
    1,
  );
  // Two times 0.08 × sqrt(1 − 2 × 0.08²); its error is 1/sqrt(N) = 0.005, four times that here.
  expect(Math.abs(lag1! - 0.159)).toBeLessThan(0.021);
});

it('a sky that is subtracted wrongly leaves its lines behind', () => {
  const residual = (flaws: FibreFlaws): number => {
    const row = observeArm(seededRandom(7), RED, new Float64Array(RED.pixels), {
      exposureS: 1800,
      airmass: 1,
      sky: DARK,
      flaws,
    });
    const line = Math.round((6302.05 - RED.firstAngstrom) / RED.stepAngstrom);
    return row.flux[line]!;
  };
  // [O I] 6300 is a hundred times the continuum there: 5 per cent too little leaves about five units.
  expect(residual({ ...FLAWLESS, skyScaleError: -0.05 }) - residual(FLAWLESS)).toBeGreaterThan(2);
});
