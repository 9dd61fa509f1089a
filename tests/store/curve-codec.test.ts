import { expect, it } from 'vitest';
import { seededRandom } from '../../pipeline/core/random.ts';
import type { Curves } from '../../pipeline/index.ts';
import { MAX_PACKED_BYTES, packCurves, unpackCurves } from '../../store/curve-codec.ts';

/** A noisy arm with lines, of about the length of one arm of a survey spectrograph. */
function noisyCurves(pixels: number, arms: number): Curves {
  const random = seededRandom(20310402);
  const arm = {
    name: 'red',
    wavelengthVacuumAngstrom: Float32Array.from({ length: pixels }, (_, i) => 5_700 * Math.exp(1.4e-4 * i)),
    flux: Float32Array.from({ length: pixels }, (_, i) => 50 + 10 * Math.sin(i / 300) + 4 * random.normal()),
    error: Float32Array.from({ length: pixels }, (_, i) => 4 + Math.sin(i / 700)),
    used: Uint8Array.from({ length: pixels }, (_, i) => (i % 50 === 0 ? 0 : 1)),
    model: Float32Array.from({ length: pixels }, (_, i) => 50 + 10 * Math.sin(i / 300)),
    runnerUpModel: Float32Array.from({ length: pixels }, (_, i) => 49 + 10 * Math.sin(i / 310)),
  };
  arm.flux[7] = Number.NaN;
  const redshift = Float32Array.from({ length: 600 }, (_, i) => i / 400);
  const chiSquare = redshift.map((z) => 4_000 - 200 * Math.exp(-(((z - 0.5) / 0.01) ** 2)));
  return { arms: Array.from({ length: arms }, () => arm), scan: [{ kind: 'galaxy', redshift, chiSquare }] };
}

it('unpackCurves() gives flux back within a sixteenth of the error, models within a sixty-fourth', () => {
  const curves = noisyCurves(2_000, 1);
  const back = unpackCurves(packCurves(curves)).arms[0]!;
  const arm = curves.arms[0]!;
  // Half a step: steps are an eighth and a thirty-second of the median error, here below 5.
  arm.flux.forEach((flux, i) => {
    if (i !== 7) expect(Math.abs(back.flux[i]! - flux)).toBeLessThan(5 / 16);
    expect(Math.abs(back.model[i]! - arm.model[i]!)).toBeLessThan(5 / 64);
  });
  expect(back.used).toEqual(arm.used);
});

it('unpackCurves() gives NaN back as NaN and an absent runner-up as an empty array', () => {
  const curves = noisyCurves(100, 1);
  const arm = { ...curves.arms[0]!, runnerUpModel: new Float32Array(0) };
  const back = unpackCurves(packCurves({ ...curves, arms: [arm] })).arms[0]!;
  expect(back.flux[7]).toBeNaN();
  expect(back.runnerUpModel).toHaveLength(0);
});

it.each([
  ['two arms of 3,000 pixels', 3_000, 2],
  ['three arms of 20,000 pixels', 20_000, 3],
])('packCurves() keeps %s under the limit of the store', (_title, pixels, arms) => {
  const packed = packCurves(noisyCurves(pixels, arms));
  expect(packed.length).toBeLessThanOrEqual(MAX_PACKED_BYTES);
  expect(unpackCurves(packed).arms).toHaveLength(arms);
});
