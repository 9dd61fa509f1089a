import { describe, expect, it } from 'vitest';
import { airToVacuum, readSpectra, readTargets, recogniseLayout } from '../../../pipeline/decode/index.ts';
import type { Spectrum } from '../../../pipeline/decode/index.ts';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { InputFault } from '../../../pipeline/errors.ts';
import { emptyPrimary, image, openedFile, table } from './in-memory-file.ts';
import type { HduMaker } from './in-memory-file.ts';

const PIXELS = 40;
const ramp = Float64Array.from({ length: PIXELS }, (_, i) => 100 + i);
const random = seededRandom(31);
const noisy = (): Float64Array => ramp.map((value) => value + random.normal());
const constant = (value: number): Float64Array => new Float64Array(PIXELS).fill(value);
const with_ = (base: Float64Array, at: number, value: number): Float64Array => {
  const copy = base.slice();
  copy[at] = value;
  return copy;
};
const AXIS = { CTYPE1: 'WAVE', CUNIT1: 'Angstrom', CRVAL1: 5000, CRPIX1: 1, CDELT1: 1 };
type Made = ReturnType<typeof openedFile>;

function readAll(input: Made): (Spectrum | InputFault)[] {
  const layout = recogniseLayout(input);
  return readSpectra(input, layout, 0, layout.rowCount);
}

function readFirst(input: Made): Spectrum {
  const first = readAll(input)[0]!;
  if (first instanceof InputFault) throw first;
  return first;
}

function stack(error: Float64Array, ...more: readonly HduMaker[]) {
  return openedFile(emptyPrimary(), image('FLUX', [ramp], AXIS), image('ERROR', [error]), ...more);
}

describe('readSpectra', () => {
  it('gives a bad row its fault and its neighbours their spectra', () => {
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [ramp, constant(NaN), ramp], AXIS),
      image('ERROR', [constant(2), constant(2), constant(2).fill(0, 5)]),
    );
    const [good, empty, short] = readAll(input);
    expect(good).toMatchObject({ inputHdu: 1, inputRow: 0 });
    expect(empty).toMatchObject({ code: 'no-usable-pixels', place: { row: 1 } });
    expect(short).toMatchObject({ code: 'too-few-pixels', place: { row: 2 } });
  });

  it('refuses more pixels than the limit', () => {
    const input = stack(constant(2));
    const tight = { ...input, limits: { ...input.limits, pixelsPerSpectrum: PIXELS - 1 } };
    expect(readAll(tight)[0]).toMatchObject({ code: 'too-many-pixels' });
  });

  it('gives weight 1/error², and none to errors that are zero, negative or not a number, or flux that is NaN', () => {
    const error = with_(with_(with_(constant(2), 0, 0), 1, -1), 2, NaN);
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [with_(ramp, 3, NaN)], AXIS),
      image('ERROR', [error]),
    );
    const weights = readFirst(input).arms[0]!.inverseVariance;
    expect([...weights.slice(0, 5)]).toEqual([0, 0, 0, 0, 0.25]);
  });

  it('keeps masked pixels in place without weight', () => {
    const arm = readFirst(stack(constant(2), image('MASK', [with_(constant(0), 7, 16)]))).arms[0]!;
    expect(arm.flux[7]).toBe(107);
    expect(arm.inverseVariance[7]).toBe(0);
    expect(arm.inverseVariance[8]).toBe(0.25);
  });

  it('turns a falling axis round with everything on it', () => {
    const axis = { ...AXIS, CRVAL1: 5039, CDELT1: -1 };
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [ramp], axis),
      image('ERROR', [with_(constant(1), 0, 2)]),
    );
    const arm = readFirst(input).arms[0]!;
    expect(arm.wavelengthVacuumAngstrom[0]).toBe(5000);
    expect(arm.flux[0]).toBe(139);
    expect(arm.inverseVariance[PIXELS - 1]).toBe(0.25);
  });

  it('takes air to vacuum, and flux per hertz to flux per ångström with its weights', () => {
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [constant(1)], { ...AXIS, CTYPE1: 'AWAV', BUNIT: 'erg/s/cm2/Hz' }),
      image('ERROR', [constant(0.5)]),
    );
    const arm = readFirst(input).arms[0]!;
    expect(arm.wavelengthVacuumAngstrom[0]).toBe(airToVacuum(5000));
    const factor = (5000 / 5039) ** 2;
    expect(arm.flux[39]).toBeCloseTo(factor, 12);
    // Signal to noise does not depend on the unit.
    expect(arm.flux[39]! * Math.sqrt(arm.inverseVariance[39]!)).toBeCloseTo(2, 12);
  });

  it('sorts arms by wavelength and leaves their pixels apart', () => {
    const input = openedFile(
      emptyPrimary(),
      image('FLUX_RED', [noisy()], { ...AXIS, CRVAL1: 6000 }),
      image('FLUX_BLUE', [noisy()], AXIS),
    );
    expect(readFirst(input).arms.map(({ name }) => name)).toEqual(['blue', 'red']);
  });

  it('cuts padding of the wavelength axis in vector cells', () => {
    const wave = Float64Array.from({ length: PIXELS }, (_, i) => (i < 30 ? 5000 + i : 0));
    const input = openedFile(
      emptyPrimary(),
      table('', [
        { name: 'wave', values: [wave] },
        { name: 'flux', values: [ramp] },
        { name: 'error', values: [constant(1)] },
      ]),
    );
    expect(readFirst(input).arms[0]!.flux).toHaveLength(30);
  });

  it('turns line spreads in pixels into km/s: 1.5 pixels of 1 Å at 5,000 Å are 89.94 km/s', () => {
    const sigma = image('LINE_SPREAD', [constant(1.5)], { BUNIT: 'pixel' });
    const arm = readFirst(stack(constant(1), sigma)).arms[0]!;
    expect(arm.lineSpreadSigmaKmS![0]).toBeCloseTo((1.5 * 299_792.458) / 5000, 6);
  });

  it('takes the width of a resolution matrix whatever its noise in the wings', () => {
    // A Gaussian of sigma 0.9 pixels, with negative noise where a real matrix has it.
    const band = (k: number): number => (Math.abs(k) > 3 ? -0.002 : Math.exp(-0.5 * (k / 0.9) ** 2));
    const rows = Array.from({ length: 11 }, (_, k) => constant(band(k - 5)));
    const input = stack(constant(1), image('RESOLUTION', rows, {}, 11));
    const sigmaPixels = (readFirst(input).arms[0]!.lineSpreadSigmaKmS![20]! / 299_792.458) * 5020;
    expect(sigmaPixels).toBeCloseTo(0.9, 2);
  });

  it('says who each row is, with 64-bit names exact, also where the pixels cannot be used', () => {
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [ramp, constant(NaN)], AXIS),
      image('ERROR', [constant(2), constant(2)]),
      table('', [
        { name: 'target_id', values: [616088619186127404n, -5n] },
        { name: 'obj_type', values: ['SKY', 'target'] },
        { name: 'target_ra', values: [12.5, 13] },
        { name: 'target_dec', values: [-3, -4] },
        { name: 'fiber', values: [17, 18] },
        { name: 'mag_r', values: [20.5, 99] },
      ]),
    );
    expect(readFirst(input)).toMatchObject({
      targetName: '616088619186127404',
      role: 'sky',
      raDeg: 12.5,
      decDeg: -3,
      fibre: 17,
      magnitude: 20.5,
      magnitudeBand: 'r',
    });
    const layout = recogniseLayout(input);
    expect(readTargets(input, layout, 1, 1)).toMatchObject([{ name: '-5', role: 'target', magnitude: null }]);
  });

  it('takes time and nights of each spectrum from a table of exposures', () => {
    const id = { name: 'target_id', values: [1n, 2n] };
    const input = openedFile(
      emptyPrimary(),
      image('FLUX', [noisy(), noisy()], AXIS),
      table('', [id]),
      table('', [
        { name: 'target_id', values: [1n, 1n, 2n] },
        { name: 'mjd', values: [60_000.25, 60_001.25, 60_000.25] },
        { name: 'exptime', values: [864, 864, 1728] },
      ]),
    );
    const [several, one] = readAll(input) as Spectrum[];
    expect(several).toMatchObject({ coaddedOverNights: true, exposureS: 1728 });
    expect(one).toMatchObject({ coaddedOverNights: false, observedAt: '2023-02-25T06:14:24.000Z' });
  });

  it('throws RangeError for rows outside the layout', () => {
    const input = stack(constant(1));
    expect(() => readSpectra(input, recogniseLayout(input), 0, 2)).toThrow(RangeError);
  });
});
