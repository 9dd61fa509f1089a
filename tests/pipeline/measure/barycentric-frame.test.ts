import { describe, expect, it } from 'vitest';
import type { Spectrum } from '../../../pipeline/decode/index.ts';
import { barycentricFrame } from '../../../pipeline/measure/barycentric-frame.ts';
import { spectrumOf } from '../../reference/synthetic-spectra.ts';

const SPECTRUM: Spectrum = {
  ...spectrumOf([]),
  observedAt: '2012-09-20T10:00:00',
  site: { latitudeDeg: 19.8263, longitudeEastDeg: -155.4747, heightM: 4145 },
  raDeg: 10.6847,
  decDeg: 41.269,
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

  it.each(['heliocentric', 'barycentric'] as const)(
    'leaves %s wavelengths alone and repeats what was applied',
    (frame) => {
      expect(barycentricFrame({ ...SPECTRUM, frame, appliedCorrectionKmS: -7.5 })).toEqual({
        velocityKmS: -7.5,
        source: 'already-applied',
      });
    },
  );
});
