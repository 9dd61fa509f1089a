import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parseProfile } from '../../../config/profile.ts';
import { readSpectra, recogniseLayout } from '../../../pipeline/decode/index.ts';
import type { Spectrum } from '../../../pipeline/decode/index.ts';
import { faultOf } from '../../support/fault-of.ts';
import { emptyPrimary, image, openedFile, table } from './in-memory-file.ts';

const PIXELS = 60;
const row = (value: number): Float64Array => new Float64Array(PIXELS).fill(value);
const AXIS = { CTYPE1: 'WAVE', CUNIT1: 'Angstrom', CRVAL1: 5000, CRPIX1: 1, CDELT1: 1 };

/** Two images that no stem tells apart, and a table in a survey's own words. */
const input = openedFile(
  emptyPrimary({ SPECSYS: 'TOPOCENT' }),
  image('ALPHA', [row(8), row(9)], AXIS),
  image('BETA', [row(2), row(2)], AXIS),
  table('LIST', [{ name: 'WHO', values: ['x1', 'x2'] }]),
);
const BASE = `
name: ours
arms:
  - flux: { hdu: ALPHA }
    spread: { hdu: beta }
    spreadMeaning: error
`;
const recognise = (text: string) => recogniseLayout(input, parseProfile(text, 'ours.yaml'));

describe('a profile', () => {
  it('is needed for this file, whose fault names the way out', () => {
    const fault = faultOf(() => recogniseLayout(input));
    expect(fault.code).toBe('layout-ambiguous');
    expect(fault.message).toContain('--profile');
  });

  it('says which image is what, names matched without regard to case', () => {
    const layout = recognise(BASE);
    expect(layout).toMatchObject({ form: 'row-stack', rowCount: 2, frame: 'topocentric' });
    expect((readSpectra(input, layout, 1, 1)[0] as Spectrum).arms[0]!.inverseVariance[5]).toBe(0.25);
  });

  it('overrules frame, site and resolving power and maps rows to targets', () => {
    const layout = recognise(`${BASE}frame: barycentric
resolvingPower: 2000
site: { latitudeDeg: -51.7, longitudeEastDeg: -59.3, heightM: 640 }
targets: { hdu: LIST, name: who }
`);
    const spectrum = readSpectra(input, layout, 0, 1)[0] as Spectrum;
    expect(spectrum).toMatchObject({ frame: 'barycentric', targetName: 'x1', site: { heightM: 640 } });
    // c / (R 2 sqrt(2 ln 2)) = 299792.458 / (2000 * 2.354820045) km/s.
    expect(spectrum.arms[0]!.lineSpreadSigmaKmS![0]).toBeCloseTo(63.65507, 4);
  });

  it.each([
    ['an HDU', BASE.replace('ALPHA', 'GAMMA')],
    ['a column', `${BASE}targets: { hdu: LIST, name: nobody }`],
    [
      'a unit',
      BASE.replace(
        'spreadMeaning',
        'wavelength: { hdu: BETA }\n    wavelengthUnit: stone\n    spreadMeaning',
      ),
    ],
    ['the meaning of the spread', BASE.replace(/ {4}spreadMeaning.*\n/, '')],
  ])('that gets %s wrong is refused', (_, text) => {
    expect(faultOf(() => recognise(text)).code).toBe('profile-invalid');
  });
});

describe('config/profiles/larkfield.yaml', () => {
  it('reads the layout it describes the same way as recognition without it', () => {
    const arm = (name: string) => [
      image(`FLUX_${name}`, [row(1), row(1)], AXIS),
      image(`FLUX_ERROR_${name}`, [row(1), row(1)]),
      image(`QUALITY_${name}`, [row(0), row(0)]),
      image(`SKY_${name}`, [row(1), row(1)]),
      image(`LINE_SPREAD_${name}`, [row(1), row(1)], { BUNIT: 'pixel' }),
    ];
    const names = [
      'fibre',
      'target_name',
      'role',
      'target_class',
      'ra',
      'dec',
      'magnitude',
      'magnitude_band',
    ];
    const file = openedFile(
      emptyPrimary({ SPECSYS: 'TOPOCENT' }),
      ...arm('BLUE'),
      ...arm('RED'),
      table(
        'FIBRES',
        names.map((name) => ({ name, values: [1, 2] })),
      ),
    );
    const path = new URL('../../../config/profiles/larkfield.yaml', import.meta.url);
    const profile = parseProfile(readFileSync(path, 'utf8'), 'larkfield.yaml');
    const without = recogniseLayout(file);
    const within = recogniseLayout(file, profile);
    expect(within.arms).toEqual(without.arms);
    expect(within.targetColumns).toEqual(without.targetColumns);
    expect(within).toMatchObject({ form: without.form, rowCount: 2, targetsHdu: without.targetsHdu });
  });
});
