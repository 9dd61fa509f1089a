import {
  type CardSpec,
  encodeFitsChunks,
  type HduSpec,
  type ImageSpec,
  type Pixels,
} from '../pipeline/encode/index.ts';
import type { Exposure } from './exposure.ts';
import { type CurlewArm, MAGNITUDE_BAND } from './instrument/curlew.ts';
import type { ObservedArm } from './instrument/observe.ts';
import { isoFromMjd } from './survey/calendar.ts';
import { geocentric, HARROW_FELL } from './survey/harrow-fell.ts';

const FLUX_UNIT_TEXT = '10**(-17) erg s-1 cm-2 Angstrom-1';
const SECONDS_PER_DAY = 86_400;

/**
 * An exposure as a FITS file in the Larkfield layout: per arm the images FLUX, FLUX_ERROR, QUALITY, SKY and
 * LINE_SPREAD with a suffix naming the arm, rows = fibres, axis 1 = linear vacuum wavelength at the telescope;
 * and the table FIBRES with one row per image row.
 *
 * @returns the file in pieces, in order
 */
export function encodeExposure(exposure: Exposure): Generator<Uint8Array, void> {
  return encodeFitsChunks(hdusOf(exposure));
}

function* hdusOf(exposure: Exposure): Generator<HduSpec> {
  yield { type: 'image', axes: [], cards: headerCards(exposure) };
  for (const { arm, rows } of exposure.arms) {
    yield imageOf('FLUX', arm, rows, ({ flux }) => flux, FLUX_UNIT_TEXT);
    yield imageOf('FLUX_ERROR', arm, rows, ({ error }) => error, FLUX_UNIT_TEXT);
    yield imageOf('QUALITY', arm, rows, ({ quality }) => quality);
    yield imageOf('SKY', arm, rows, ({ sky }) => sky, FLUX_UNIT_TEXT);
    yield imageOf('LINE_SPREAD', arm, rows, ({ lineSpread }) => lineSpread, 'pixel');
  }
  yield fibresTable(exposure);
}

function headerCards({ field, conditions }: Exposure): CardSpec[] {
  const startMjd = conditions.midMjd - conditions.exposureS / 2 / SECONDS_PER_DAY;
  return [
    { keyword: 'TELESCOP', value: 'Harrow Fell 3.1 m' },
    { keyword: 'INSTRUME', value: 'Curlew' },
    { keyword: 'OBJECT', value: field.name, comment: 'field' },
    { keyword: 'OBS_ID', value: conditions.id },
    { keyword: 'RA', value: field.raDeg, comment: '[deg] centre of the field' },
    { keyword: 'DEC', value: field.decDeg, comment: '[deg] centre of the field' },
    { keyword: 'RADESYS', value: 'ICRS' },
    { keyword: 'TIMESYS', value: 'UTC' },
    { keyword: 'DATE-OBS', value: isoFromMjd(startMjd), comment: 'start of the exposure' },
    { keyword: 'MJD-AVG', value: conditions.midMjd, comment: '[d] middle of the exposure' },
    { keyword: 'EXPTIME', value: conditions.exposureS, comment: '[s]' },
    { keyword: 'AIRMASS', value: conditions.airmass },
    ...frameCards(),
  ];
}

function frameCards(): CardSpec[] {
  const [x, y, z] = geocentric(HARROW_FELL);
  return [
    { keyword: 'SPECSYS', value: 'TOPOCENT', comment: 'wavelengths as seen at the telescope' },
    { keyword: 'OBSGEO-X', value: x, comment: '[m]' },
    { keyword: 'OBSGEO-Y', value: y, comment: '[m]' },
    { keyword: 'OBSGEO-Z', value: z, comment: '[m]' },
  ];
}

function imageOf(
  what: string,
  arm: CurlewArm,
  rows: readonly ObservedArm[],
  arrayOf: (row: ObservedArm) => Float32Array | Uint8Array,
  unit?: string,
): ImageSpec {
  const count = arm.pixels * rows.length;
  const pixels: Pixels = what === 'QUALITY' ? new Uint8Array(count) : new Float32Array(count);
  rows.forEach((row, r) => {
    pixels.set(arrayOf(row), r * arm.pixels);
  });
  return {
    type: 'image',
    name: `${what}_${arm.name}`,
    axes: [arm.pixels, rows.length],
    pixels,
    ...(unit === undefined ? {} : { unit }),
    cards: [
      { keyword: 'CTYPE1', value: 'WAVE', comment: 'vacuum wavelength' },
      { keyword: 'CUNIT1', value: 'Angstrom' },
      { keyword: 'CRPIX1', value: 1 },
      { keyword: 'CRVAL1', value: arm.firstAngstrom },
      { keyword: 'CDELT1', value: arm.stepAngstrom },
      ...frameCards(),
    ],
  };
}

function fibresTable({ field: { aims } }: Exposure): HduSpec {
  return {
    type: 'table',
    name: 'FIBRES',
    rowCount: aims.length,
    columns: [
      { name: 'fibre', type: 'int32', values: aims.map(({ fibre }) => fibre) },
      {
        name: 'target_name',
        type: 'string',
        ucd: 'meta.id;meta.main',
        values: aims.map((aim) => aim.targetName),
      },
      { name: 'role', type: 'string', values: aims.map(({ role }) => role) },
      { name: 'target_class', type: 'string', values: aims.map((aim) => aim.targetClass) },
      {
        name: 'ra',
        type: 'float64',
        unit: 'deg',
        ucd: 'pos.eq.ra;meta.main',
        values: aims.map((aim) => aim.raDeg),
      },
      {
        name: 'dec',
        type: 'float64',
        unit: 'deg',
        ucd: 'pos.eq.dec;meta.main',
        values: aims.map((aim) => aim.decDeg),
      },
      {
        name: 'magnitude',
        type: 'float32',
        unit: 'mag',
        ucd: 'phot.mag',
        values: aims.map(({ source }) => source?.magnitude ?? null),
      },
      {
        name: 'magnitude_band',
        type: 'string',
        values: aims.map(({ source }) => (source === null ? '' : MAGNITUDE_BAND.name)),
      },
    ],
  };
}
