import { describe, expect, it } from 'vitest';
import type { Spectrum } from '../../../pipeline/decode/index.ts';
import { barycentricFrame, parseUtc } from '../../../pipeline/measure/barycentric-frame.ts';

const SPECTRUM: Spectrum = {
  inputHdu: 0,
  inputRow: null,
  arms: [],
  frame: 'topocentric',
  appliedCorrectionKmS: null,
  observedAt: '2012-09-20T10:00:00',
  exposureS: 1800,
  coaddedOverNights: false,
  site: { latitudeDeg: 19.8263, longitudeEastDeg: -155.4747, heightM: 4145 },
  raDeg: 10.6847,
  decDeg: 41.269,
  targetName: null,
  field: null,
  exposureId: null,
  fibre: null,
  role: 'target',
  targetClass: null,
  magnitude: null,
  magnitudeBand: null,
  notes: [],
};

describe('barycentricFrame()', () => {
  it('corrects topocentric wavelengths when time, place and direction are known (astropy: 12.2058 km/s)', () => {
    const { velocityKmS, source } = barycentricFrame(SPECTRUM);
    expect(source).toBe('applied-here');
    expect(velocityKmS).toBeCloseTo(12.2058454, 2);
  });

  it.each([
    ['a site', { site: null }],
    ['a direction', { raDeg: null }],
    ['a time', { observedAt: null }],
    ['one night', { coaddedOverNights: true }],
    ['a frame', { frame: 'unknown' }],
  ] as const)('says unknown, never zero, without %s', (_missing, change) => {
    expect(barycentricFrame({ ...SPECTRUM, ...change })).toEqual({ velocityKmS: null, source: 'unknown' });
  });

  it.each(['heliocentric', 'barycentric'] as const)('leaves %s wavelengths alone and repeats what was applied', (frame) => {
    expect(barycentricFrame({ ...SPECTRUM, frame, appliedCorrectionKmS: -7.5 })).toEqual({
      velocityKmS: -7.5,
      source: 'already-applied',
    });
  });
});

describe('parseUtc()', () => {
  it.each(['1970-01-01T00:00:00', '2000-02-29T12:34:56.789', '2031-04-02', '2100-03-01T00:00:00Z', '1999-12-31T23:59'])(
    "agrees with the platform's calendar on %s",
    (text) => {
      const withZone = text.endsWith('Z') || !text.includes('T') ? text : `${text}Z`;
      expect(parseUtc(text)).toBeCloseTo(Date.parse(withZone), 3);
    },
  );

  it('gives NaN for anything else', () => {
    expect(parseUtc('yesterday')).toBeNaN();
    expect(parseUtc('')).toBeNaN();
  });
});
