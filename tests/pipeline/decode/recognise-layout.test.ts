import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../../pipeline/core/random.ts';
import { recogniseLayout } from '../../../pipeline/decode/index.ts';
import { faultOf } from '../../support/fault-of.ts';
import { emptyPrimary, image, openedFile, table } from './in-memory-file.ts';

const PIXELS = 400;
const random = seededRandom(21);
const SIGMA = 0.5;
const noisy = (): Float64Array => Float64Array.from({ length: PIXELS }, () => 10 + SIGMA * random.normal());
const constant = (value: number): Float64Array => new Float64Array(PIXELS).fill(value);
const wave = Float64Array.from({ length: PIXELS }, (_, i) => 4000 + 2 * i);
const AXIS = { CTYPE1: 'WAVE', CUNIT1: 'Angstrom', CRVAL1: 4000, CRPIX1: 1, CDELT1: 2 };

function larkfield(spectra: number) {
  const stack = (make: () => Float64Array) => Array.from({ length: spectra }, make);
  const arm = (name: string) => [
    image(`FLUX_${name}`, stack(noisy), AXIS),
    image(
      `FLUX_ERROR_${name}`,
      stack(() => constant(SIGMA)),
      AXIS,
    ),
    image(
      `QUALITY_${name}`,
      stack(() => constant(0)),
      AXIS,
    ),
    image(
      `SKY_${name}`,
      stack(() => constant(3)),
      AXIS,
    ),
    image(
      `LINE_SPREAD_${name}`,
      stack(() => constant(1.2)),
      { ...AXIS, BUNIT: 'pixel' },
    ),
  ];
  const rows = Array.from({ length: spectra }, (_, i) => i);
  return openedFile(
    emptyPrimary({ SPECSYS: 'TOPOCENT', OBJECT: 'LF-17' }),
    ...arm('BLUE'),
    ...arm('RED'),
    table('FIBRES', [
      { name: 'fibre', values: rows.map((i) => i + 1) },
      { name: 'target_name', values: rows.map((i) => `LF-${i}`) },
      { name: 'role', values: rows.map((i) => (i === 1 ? 'sky' : 'target')) },
      { name: 'ra', values: rows.map(() => 10.5) },
      { name: 'dec', values: rows.map(() => -51.25) },
    ]),
  );
}

describe('recogniseLayout of images', () => {
  it('reads two arms of named images with a table of fibres, told apart by their suffix', () => {
    const layout = recogniseLayout(larkfield(3));
    expect(layout).toMatchObject({ form: 'row-stack', rowCount: 3, frame: 'topocentric', targetsHdu: 11 });
    expect(layout.arms.map(({ name }) => name)).toEqual(['blue', 'red']);
    expect(layout.arms[1]).toMatchObject({
      flux: { hdu: 6 },
      spread: { hdu: 7 },
      spreadMeaning: 'error',
      quality: [{ hdu: 8 }],
      sky: { hdu: 9 },
      lineSpread: { hdu: 10 },
      lineSpreadMeaning: 'sigma-pixel',
      wavelength: null,
      medium: 'vacuum',
    });
    expect(layout.missing).toEqual([]);
  });

  it('is a plain value: text and back gives the same', () => {
    const layout = recogniseLayout(larkfield(2));
    expect(JSON.parse(JSON.stringify(layout))).toEqual(layout);
  });

  it('tells arms by a prefix too, with one wavelength row for all spectra and a resolution matrix', () => {
    const rows = [noisy(), noisy()];
    const bands = Array.from({ length: 2 * 5 }, () => constant(0.2));
    const input = openedFile(
      emptyPrimary(),
      image('U_WAVELENGTH', [wave], { BUNIT: 'Angstrom' }),
      image('U_FLUX', rows),
      image('U_IVAR', [constant(4), constant(4)]),
      image('U_RESOLUTION', bands, {}, 5),
    );
    const [arm] = recogniseLayout(input).arms;
    expect(arm).toMatchObject({ name: 'u', wavelength: { hdu: 1 }, spreadMeaning: 'inverse-variance' });
    expect(arm).toMatchObject({ lineSpread: { hdu: 4 }, lineSpreadMeaning: 'resolution-matrix' });
  });

  it.each([
    ['error', SIGMA],
    ['variance', SIGMA ** 2],
    ['inverse-variance', SIGMA ** -2],
  ])('finds the rows of one spectrum by their numbers when the second is the %s', (meaning, value) => {
    const mask = constant(0).fill(64, 100, 110);
    const input = openedFile(image('', [noisy(), constant(value), wave, mask]));
    const layout = recogniseLayout(input);
    expect(layout.form).toBe('image-one-spectrum');
    expect(layout.arms[0]).toMatchObject({
      flux: { imageRow: 0 },
      spread: { imageRow: 1 },
      spreadMeaning: meaning,
      wavelength: { imageRow: 2 },
      quality: [{ imageRow: 3 }],
    });
  });

  it('takes few rows that look alike for a small stack of spectra', () => {
    const layout = recogniseLayout(openedFile(image('', [noisy(), noisy(), noisy()], AXIS)));
    expect(layout).toMatchObject({ form: 'row-stack', rowCount: 3 });
    expect(layout.missing.join()).toContain('noise will be estimated');
  });

  it('faults two unnamed images, arms of different heights and images without wavelengths', () => {
    const two = openedFile(image('', [noisy()], AXIS), image('', [noisy()], AXIS));
    expect(faultOf(() => recogniseLayout(two)).code).toBe('layout-ambiguous');
    const uneven = openedFile(
      emptyPrimary(),
      image('FLUX_A', [noisy(), noisy()], AXIS),
      image('FLUX_B', [noisy(), noisy(), noisy()], AXIS),
    );
    expect(faultOf(() => recogniseLayout(uneven)).code).toBe('shape-mismatch');
    expect(faultOf(() => recogniseLayout(openedFile(image('', [noisy()])))).code).toBe('wavelength-missing');
    expect(faultOf(() => recogniseLayout(openedFile(emptyPrimary()))).code).toBe('layout-unknown');
  });
});

describe('recogniseLayout of tables', () => {
  const perPixel = (name: string, values: Float64Array, unit = '') => ({ name, unit, values: [...values] });

  it('reads a row per pixel with log10 wavelengths, whatever the case and order of columns', () => {
    const input = openedFile(
      emptyPrimary(),
      table('', [
        perPixel('Sky', constant(1)),
        perPixel('flux', noisy()),
        perPixel('LOG_WAVE', wave.map(Math.log10)),
        perPixel('invvar', constant(4)),
        perPixel('model_flux', constant(1)),
      ]),
    );
    const layout = recogniseLayout(input);
    expect(layout.form).toBe('table-row-per-pixel');
    expect(layout.arms[0]).toMatchObject({
      flux: { column: 'flux' },
      wavelength: { column: 'LOG_WAVE' },
      wavelengthMeaning: 'log10',
      spreadMeaning: 'inverse-variance',
      sky: { column: 'Sky' },
    });
  });

  it('goes by UCDs where names say nothing', () => {
    const input = openedFile(
      emptyPrimary(),
      table('', [
        { name: 'c1', ucd: 'em.wl', unit: 'nm', values: [...wave.map((value) => value / 10)] },
        { name: 'c2', ucd: 'phot.flux.density;em.wl', values: [...noisy()] },
        { name: 'c3', ucd: 'stat.error;phot.flux.density;em.wl', values: [...constant(SIGMA)] },
      ]),
    );
    expect(recogniseLayout(input).arms[0]).toMatchObject({
      wavelength: { column: 'c1' },
      wavelengthUnitAngstrom: 10,
      flux: { column: 'c2' },
      spread: { column: 'c3' },
      spreadMeaning: 'error',
    });
  });

  it('reads a row per spectrum in vector cells and names targets from the same table', () => {
    const input = openedFile(
      emptyPrimary(),
      table('', [
        { name: 'object', values: ['a', 'b'] },
        { name: 'wavelength', unit: 'Angstrom', values: [wave, wave] },
        { name: 'flux', values: [noisy(), noisy()] },
        { name: 'flux_err', values: [constant(SIGMA), constant(SIGMA)] },
      ]),
    );
    const layout = recogniseLayout(input);
    expect(layout).toMatchObject({ form: 'table-row-per-spectrum', rowCount: 2, targetsHdu: 1 });
    expect(layout.targetColumns?.name).toBe('object');
  });

  it('does not take a table of targets with broad-band fluxes for a spectrum', () => {
    const targets = table('', [
      { name: 'flux_r', values: [...noisy()] },
      { name: 'lambda_ref', values: [...constant(5400)] },
    ]);
    expect(faultOf(() => recogniseLayout(openedFile(emptyPrimary(), targets))).code).toBe('layout-unknown');
  });

  it('reads the first of several tables with equal columns and faults different ones', () => {
    const columns = [perPixel('wave', wave), perPixel('flux', noisy())];
    const twice = openedFile(emptyPrimary(), table('SUM', columns), table('PART', columns));
    expect(recogniseLayout(twice).arms[0]!.flux.hdu).toBe(1);
    const other = table('', [...columns, perPixel('error', constant(1))]);
    const mixed = openedFile(emptyPrimary(), table('', columns), other);
    expect(faultOf(() => recogniseLayout(mixed)).code).toBe('layout-ambiguous');
  });

  it('passes over a picture without wavelengths beside the table', () => {
    const columns = [perPixel('wave', wave), perPixel('flux', noisy())];
    expect(recogniseLayout(openedFile(image('', [noisy()]), table('', columns))).form).toBe(
      'table-row-per-pixel',
    );
  });
});
