import { createHash } from 'node:crypto';
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import {
  DEFAULT_SURVEY,
  encodeExposure,
  makersFrom,
  type NightExposure,
  simulateNights,
  truthCsv,
  truthOf,
} from '../../simulate/index.ts';
import { starsFromFile } from '../../templates/prepare/file-contents.ts';
import { hasOutsideTool, PYTHON } from '../support/outside-tool.ts';

const MAKERS = makersFrom(
  starsFromFile(
    new Uint8Array(readFileSync(new URL('../../templates/families/stars.fits', import.meta.url))),
  ),
);
const FIBRES = 10;
const VELOCITY_KM_S = 18;

const nightOf = (seed: number): Generator<NightExposure, void> =>
  simulateNights({ ...DEFAULT_SURVEY, seed, fibres: FIBRES }, MAKERS, () => VELOCITY_KM_S);
const firstOf = (seed: number): NightExposure => {
  for (const exposure of nightOf(seed)) return exposure;
  throw new Error('the night has no exposure');
};
const bytesOf = ({ exposure }: NightExposure): Uint8Array => {
  const chunks = [...encodeExposure(exposure)];
  return Buffer.concat(chunks);
};
const night = [...nightOf(1)];
const first = night[0]!;

it('the same seed gives the same bytes and the same truth, another seed neither', () => {
  const digest = (exposure: NightExposure): string => {
    const hash = createHash('sha256');
    for (const chunk of encodeExposure(exposure.exposure)) hash.update(chunk);
    return hash.digest('hex');
  };
  const again = firstOf(1);
  const other = firstOf(2);
  expect(digest(again)).toBe(digest(first));
  expect(truthOf(again)).toEqual(truthOf(first));
  expect(digest(other)).not.toBe(digest(first));
});

it('a night is three exposures of the same targets at growing airmass, and one file that broke off', () => {
  expect(night.map(({ keep }) => keep < 1)).toEqual([false, false, false, true]);
  const airmasses = night.map(({ exposure }) => exposure.conditions.airmass);
  expect(airmasses.every((airmass, i) => airmass > 1 && (i === 0 || airmass > airmasses[i - 1]!))).toBe(true);
  expect(truthOf(night[1]!).map(({ select, redshift }) => [select, redshift])).toEqual(
    truthOf(first).map(({ select, redshift }) => [select, redshift]),
  );
  expect(truthOf(night[3]!)).toEqual([]);
});

it('one fibre is dead in both arms, one sees nothing in the red, the others are mostly good', () => {
  const marked = first.exposure.field.aims.map(({ fibre }, i) => ({
    mishap: first.exposure.mishaps.get(fibre),
    share: first.exposure.arms.map(
      ({ rows }) =>
        rows[i]!.quality.reduce((sum, value) => sum + Number(value !== 0), 0) / rows[i]!.quality.length,
    ),
  }));
  expect(marked.filter(({ mishap }) => mishap === 'dead').map(({ share }) => share)).toEqual([[1, 1]]);
  const half = marked.filter(({ mishap }) => mishap === 'half-covered');
  expect(half.map(({ share }) => share[1])).toEqual([1]);
  const rest = marked.filter(({ mishap }) => mishap === undefined).flatMap(({ share }) => share);
  expect(Math.max(...rest)).toBeLessThan(0.05);
});

it('the truth table has one line per fibre, and none of a file that broke off', () => {
  const lines = truthCsv(night.flatMap(truthOf)).trimEnd().split('\n');
  expect(lines).toHaveLength(1 + 3 * FIBRES);
  expect(lines[0]).toBe('file,row,select,kind,redshift,reference_trust,group,magnitude');
  expect(lines.filter((line) => line.includes(',none,'))).toHaveLength(3 * (FIBRES / 10 + 1));
});

it('numbers of nights, fields and fibres out of range are refused', () => {
  for (const wrong of [{ nights: 0 }, { fields: 6 }, { fibres: 241 }, { fibres: 1.5 }]) {
    expect(() => [...simulateNights({ ...DEFAULT_SURVEY, ...wrong }, MAKERS, () => 0)]).toThrow(RangeError);
  }
});

const hasAstropy = hasOutsideTool(PYTHON, ['-c', 'import astropy.io.fits'], 'python3-astropy');
it.skipIf(!hasAstropy)('astropy reads wavelengths, fluxes and targets as they were simulated', () => {
  const folder = mkdtempSync(join(tmpdir(), 'shiftwork-night-'));
  const file = join(folder, first.file);
  writeFileSync(file, bytesOf(first));
  const program = `
import json, sys
from astropy.io import fits
from astropy.wcs import WCS
h = fits.open(sys.argv[1], checksum=True)
w = WCS(h['FLUX_RED'].header)
print(json.dumps({
  'wavelength': float(w.pixel_to_world_values(1000, 0)[0]),
  'flux': float(h['FLUX_RED'].data[3, 1000]),
  'names': [n.strip() for n in h['FIBRES'].data['target_name']],
  'frame': h['FLUX_RED'].header['SPECSYS'],
}))`;
  const said = JSON.parse(
    execFileSync(PYTHON, ['-W', 'ignore', '-c', program, file], { encoding: 'utf8' }),
  ) as {
    readonly wavelength: number;
    readonly flux: number;
    readonly names: readonly string[];
    readonly frame: string;
  };
  rmSync(folder, { recursive: true });
  // Metres: 5700 Å + 1000 pixels of 1.5 Å.
  expect(said.wavelength).toBeCloseTo(7200e-10, 15);
  expect(said.flux).toBe(first.exposure.arms[1]!.rows[3]!.flux[1000]);
  expect(said.names).toEqual(first.exposure.field.aims.map(({ targetName }) => targetName));
  expect(said.frame).toBe('TOPOCENT');
});
