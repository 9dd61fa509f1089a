import { describe, expect, it } from 'vitest';
import { isoDateOfMjd, mjdOfIsoDate } from '../../../pipeline/decode/calendar.ts';
import { exposureTimeOf } from '../../../pipeline/decode/exposure-time.ts';
import type { CardValue } from '../../../pipeline/decode/fits/index.ts';
import { frameOf } from '../../../pipeline/decode/frame.ts';
import { geodeticSite, siteOf } from '../../../pipeline/decode/site.ts';
import { statedMedium } from '../../../pipeline/decode/medium.ts';
import { headerOf } from './in-memory-file.ts';

const of = (cards: Readonly<Record<string, CardValue>>) => [headerOf(cards)];

describe('mjdOfIsoDate and isoDateOfMjd', () => {
  it.each([
    // Modified Julian Dates by astropy 5.2.1 (Time(..., scale='utc').mjd).
    ['2031-04-02T03:04:05.600Z', 62958.12784259259],
    ['1999-12-31T23:59:59.999Z', 51543.999999988424],
    ['2000-02-29T12:00:00.000Z', 51603.5],
    ['1858-11-17T00:00:00.000Z', 0],
  ])('take %s to its date and back', (text, mjd) => {
    expect(Math.abs(mjdOfIsoDate(text)! - mjd)).toBeLessThan(1e-9);
    expect(isoDateOfMjd(mjd)).toBe(text);
  });

  it('reads a date alone, the older form of FITS, and refuses what is no date', () => {
    expect(mjdOfIsoDate('2000-02-29')).toBe(51603);
    expect(mjdOfIsoDate('31/12/99')).toBe(51543);
    expect(mjdOfIsoDate('2031-13-02')).toBeNull();
    expect(mjdOfIsoDate('yesterday')).toBeNull();
  });
});

describe('geodeticSite', () => {
  it('finds latitude, longitude and height within 1e-9 degrees and 1e-3 m, also near a pole', () => {
    // Geocentric metres by astropy 5.2.1 (EarthLocation.from_geodetic on WGS84).
    const hill = geodeticSite(2022570.137961857, -3406396.3411820605, -4982686.455131713);
    expect(Math.abs(hill.latitudeDeg + 51.7)).toBeLessThan(1e-9);
    expect(Math.abs(hill.longitudeEastDeg + 59.3)).toBeLessThan(1e-9);
    expect(Math.abs(hill.heightM - 640)).toBeLessThan(1e-3);
    const pole = geodeticSite(-5.174514549750129, 9.906354164765089, 6360752.314235426);
    expect(Math.abs(pole.latitudeDeg - 89.9999)).toBeLessThan(1e-9);
    expect(Math.abs(pole.heightM - 4000)).toBeLessThan(1e-3);
  });
});

describe('siteOf', () => {
  it('reads the standard cards without remarks and generic ones with', () => {
    expect(siteOf(of({ 'OBSGEO-B': -51.7, 'OBSGEO-L': -59.3, 'OBSGEO-H': 640 }))).toEqual({
      site: { latitudeDeg: -51.7, longitudeEastDeg: -59.3, heightM: 640 },
      notes: [],
    });
    const generic = siteOf(of({ 'SITE-LAT': '-51.7', 'SITE-LONG': 300.7 }))!;
    expect(generic.site.longitudeEastDeg).toBeCloseTo(-59.3, 9);
    expect(generic.notes).toHaveLength(2);
  });

  it('finds nothing in cards that only look like a position', () => {
    expect(siteOf(of({ PLATE: 45, LATENCY: 3, LONGSTR: 'OGIP 1.0', ALT: 45 }))).toBeNull();
  });
});

describe('frameOf', () => {
  it.each([
    ['SPECSYS alone', { SPECSYS: 'TOPOCENT' }, 'topocentric', null],
    ['SPECSYS with VELOSYS in m/s', { SPECSYS: 'BARYCENT', VELOSYS: 12_250 }, 'barycentric', 12.25],
    ['the size of a heliocentric correction', { HELIOCOR: -17.4 }, 'heliocentric', -17.4],
    ['a switch and a size', { HELIO: true, HELIOV: 9.5 }, 'heliocentric', 9.5],
    ['a switch that is off', { BARYCORR: false, BARYVEL: 9.5 }, 'topocentric', null],
    [
      'a computed size that SPECSYS says was not applied',
      { HELIOV: 9.5, SPECSYS: 'TOPOCENT' },
      'topocentric',
      null,
    ],
    ['a frame not of this solar system', { SPECSYS: 'LSRK' }, 'unknown', null],
    ['a heliocentric date', { HELIOJD: 24.5 }, 'unknown', null],
    ['a size that no orbit explains', { HELIOV: 250 }, 'unknown', null],
  ])('reads %s', (_, cards, frame, appliedCorrectionKmS) => {
    expect(frameOf(of(cards as Record<string, CardValue>))).toMatchObject({ frame, appliedCorrectionKmS });
  });
});

describe('exposureTimeOf', () => {
  it.each([
    ['MJD-AVG first', { 'MJD-AVG': 60_000.5, 'DATE-OBS': '2001-01-01' }, '2023-02-25T12:00:00.000Z'],
    [
      'begin plus half the exposure',
      { 'DATE-OBS': '2031-04-02T03:00:00', EXPTIME: 1200 },
      '2031-04-02T03:10:00.000Z',
    ],
    [
      'the middle of begin and end',
      { 'DATE-OBS': '2031-04-02T03:00:00', 'DATE-END': '2031-04-02T03:30:00' },
      '2031-04-02T03:15:00.000Z',
    ],
    ['MJD-OBS', { 'MJD-OBS': 60_000, EXPTIME: 86.4 }, '2023-02-25T00:00:43.200Z'],
  ])('takes %s', (_, cards, expected) => {
    expect(exposureTimeOf(of(cards as Record<string, CardValue>)).observedAt).toBe(expected);
  });

  it('distrusts begin and end that do not hold DATE-OBS, and says so', () => {
    const cards = {
      'DATE-OBS': '2031-04-02T20:00:00',
      'DATE-BEG': '2031-04-03T03:00:00',
      'DATE-END': '2031-04-03T04:00:00',
    };
    const { observedAt, notes } = exposureTimeOf(of(cards));
    expect(observedAt).toBe('2031-04-02T20:00:00.000Z');
    expect(notes.join()).toContain('local time');
  });

  it('knows a co-add over nights by a list of dates', () => {
    expect(exposureTimeOf(of({ MJDS: '55680 55681' })).coaddedOverNights).toBe(true);
    expect(exposureTimeOf(of({ MJDS: '55680 55680' })).coaddedOverNights).toBe(false);
  });
});

describe('statedMedium', () => {
  it.each([
    ['a switch', of({ VACUUM: true }), [], 'vacuum'],
    ['a switch that is off', of({ VACWAVE: false }), [], 'air'],
    ['the name of the array', of({}), ['wave_air'], 'air'],
    ['a text about wavelengths', of({ WAVETYPE: 'vacuum' }), [], 'vacuum'],
    ['a comment', [headerOf({}, ['Wavelengths are in air'])], [], 'air'],
  ])('believes %s', (_, headers, names, medium) => {
    expect(statedMedium(headers, names)?.medium).toBe(medium);
  });

  it('takes neither an air mass nor a vacuum pump for a statement', () => {
    expect(
      statedMedium([headerOf({ AIRMASS: 1.2, VACPRESS: 3e-6 }, ['air temperature 5 C'])], []),
    ).toBeNull();
  });
});
