import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { buildPopulations, buildQuasars } from '../../templates/derived-files.ts';
import {
  FAMILY_FILE_NAMES,
  type Manifest,
  manifestDisagreements,
  manifestOf,
} from '../../templates/manifest.ts';
import { readFileSync } from 'node:fs';
import { printSkipReason, sharedPath } from '../support/shared-data.ts';
import { installedBytes } from './installed-files.ts';

const manifest = JSON.parse(new TextDecoder().decode(installedBytes('manifest.json'))) as Manifest;
const installed = (): Record<(typeof FAMILY_FILE_NAMES)[number], Uint8Array> => ({
  'stars.fits': installedBytes('stars.fits'),
  'populations.fits': installedBytes('populations.fits'),
  'quasars.fits': installedBytes('quasars.fits'),
});
const hashOf = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

const list = sharedPath('design', 'checks', 'lines_lite.csv');
if (list === null) printSkipReason('the list of atomic lines');

describe('templates/families', () => {
  it('agree with their manifest', () => {
    expect(manifestDisagreements(manifest, installed())).toEqual([]);
  });

  it('hold the populations that the stars give, byte for byte', () => {
    expect(hashOf(buildPopulations(installedBytes('stars.fits')))).toBe(
      manifest.files['populations.fits'].sha256,
    );
  });

  it.skipIf(list === null)('hold the quasars that the line list gives, byte for byte', () => {
    const bytes = new Uint8Array(readFileSync(list!));
    expect(hashOf(bytes)).toBe(manifest.inputs['lines']?.sha256);
    expect(hashOf(buildQuasars(new TextDecoder().decode(bytes)))).toBe(manifest.files['quasars.fits'].sha256);
  });
});

describe('manifestDisagreements()', () => {
  it('names a file that changed by one byte, one that is missing, and another preparation', () => {
    const files = installed();
    const changed = files['quasars.fits'].slice();
    changed[5000]! ^= 1;
    expect(manifestDisagreements(manifest, { ...files, 'quasars.fits': changed })).toEqual([
      expect.stringContaining('quasars.fits must have sha256') as string,
    ]);
    const { 'stars.fits': stars, ...rest } = files;
    expect(stars.length).toBeGreaterThan(0);
    expect(manifestDisagreements(manifest, rest)).toEqual(['stars.fits must be there, it is missing']);
    expect(manifestDisagreements({ ...manifest, preparationVersion: -1 }, files).length).toBe(1);
  });

  it('finds nothing to say about the manifest just made of the same files', () => {
    expect(manifestDisagreements(manifestOf(installed(), {}), installed())).toEqual([]);
  });
});
