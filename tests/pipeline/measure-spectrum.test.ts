import { readFileSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { beforeAll, describe, expect, it } from 'vitest';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import {
  bytesInMemory,
  DEFAULT_READ_LIMITS,
  openInput,
  readSpectra,
  recogniseLayout,
  type Spectrum,
} from '../../pipeline/decode/index.ts';
import { InputFault } from '../../pipeline/errors.ts';
import { NO_EXPOSURE_CONTEXT } from '../../pipeline/grid/index.ts';
import { type Answer, measureSpectrum } from '../../pipeline/index.ts';
import { type FamilyLibrary, loadFamilyLibrary } from '../../templates/library.ts';
import { spectrumOf } from '../reference/synthetic-spectra.ts';
import { printSkipReason, sharedPath } from '../support/shared-data.ts';

const SPEED_OF_LIGHT_KM_S = 299_792.458;
/** Every n-th spectrum of the development set: enough to see a broken stage, few enough for every test run. */
const STRIDE = 16;

interface Truth {
  readonly file: string;
  readonly select: string;
  readonly kind: string;
  readonly redshift: number;
  readonly group: string;
}

const truthPath = sharedPath('data', 'real', 'truth.csv');
if (truthPath === null) printSkipReason('measuring real spectra');

let library: FamilyLibrary;

beforeAll(() => {
  const file = (name: string): Uint8Array =>
    readFileSync(new URL(`../../templates/families/${name}`, import.meta.url));
  library = loadFamilyLibrary({
    stars: file('stars.fits'),
    populations: file('populations.fits'),
    quasars: file('quasars.fits'),
  });
});

function secureReferences(path: string): Truth[] {
  const [header, ...lines] = readFileSync(path, 'utf8').trim().split(/\r?\n/);
  const place = (name: string): number => header!.split(',').indexOf(name);
  return lines
    .map((line) => line.split(','))
    .filter((cells) => cells[place('reference_trust')] === 'sure' && cells[place('redshift')] !== '')
    .map((cells) => ({
      file: cells[place('file')]!,
      select: cells[place('select')]!,
      kind: cells[place('kind')]!,
      redshift: Number(cells[place('redshift')]),
      group: cells[place('group')]!.trim(),
    }));
}

function read({ file, select }: Truth): Spectrum {
  const raw = readFileSync(sharedPath('data', 'real', file)!);
  const bytes = file.endsWith('.gz') ? gunzipSync(raw) : raw;
  const input = openInput(bytesInMemory(file, new Uint8Array(bytes)), DEFAULT_READ_LIMITS);
  const layout = recogniseLayout(input);
  const spectra = readSpectra(input, layout, 0, layout.rowCount).filter(
    (one): one is Spectrum => !(one instanceof InputFault),
  );
  return spectra.find((one) => select === '' || one.targetName === select)!;
}

/** What 'right' means for each kind, km/s (the data's own README; wider where the references are biased). */
function limitKmS({ kind, group }: Truth): number {
  if (kind === 'galaxy') return group.startsWith('slit') ? 600 : 300;
  if (kind === 'star') return group.startsWith('stars-r1800') ? 200 : 100;
  return 1500;
}

function isRight(truth: Truth, answer: Answer): boolean {
  if (answer.redshift === null) return false;
  const offset = (SPEED_OF_LIGHT_KM_S * Math.abs(answer.redshift - truth.redshift)) / (1 + truth.redshift);
  return offset < limitKmS(truth);
}

describe.skipIf(truthPath === null)(
  'measureSpectrum() on real spectra with secure catalogue redshifts',
  () => {
    /** Least share of right answers before review, by kind; the sample is every 16th spectrum of each. */
    const FLOORS = [
      ['star', (t: Truth) => t.kind === 'star', 0.9],
      ['galaxy with an error column', (t: Truth) => t.kind === 'galaxy' && !t.group.startsWith('slit'), 0.83],
      ['quasar', (t: Truth) => t.kind === 'quasar', 0.8],
      ['faint galaxy without an error column', (t: Truth) => t.group.startsWith('slit'), 0.7],
    ] as const;

    it.each(FLOORS)('finds the redshift of at least the floor of: %s', (_name, belongs, floor) => {
      const sample = secureReferences(truthPath!)
        .filter(belongs)
        .filter((_, i) => i % STRIDE === 0);
      const wrong = sample.filter((truth) => {
        const { answer } = measureSpectrum(
          read(truth),
          NO_EXPOSURE_CONTEXT,
          library,
          DEFAULT_MEASURING_OPTIONS,
        );
        return !isRight(truth, answer);
      });
      expect(sample.length).toBeGreaterThanOrEqual(4);
      expect(
        1 - wrong.length / sample.length,
        `wrong: ${wrong.map((t) => t.file).join(', ')}`,
      ).toBeGreaterThanOrEqual(floor);
    });
  },
);

describe('measureSpectrum()', () => {
  const wavelength = Float64Array.from({ length: 4000 }, (_, i) => 3700 + 1.4 * i);

  function flatSpectrum(flux: Float64Array): Spectrum {
    const inverseVariance = new Float64Array(flux.length).fill(1);
    return {
      ...spectrumOf([{ wavelengthVacuumAngstrom: wavelength, flux, inverseVariance }]),
      inputRow: 7,
      frame: 'barycentric',
    };
  }

  const measure = (flux: Float64Array): Answer =>
    measureSpectrum(flatSpectrum(flux), NO_EXPOSURE_CONTEXT, library, DEFAULT_MEASURING_OPTIONS).answer;

  it('gives the same answer twice: nothing is remembered between spectra', () => {
    const flux = wavelength.map((w) => 20 + 10 * Math.exp(-0.5 * ((w - 6511) / 4) ** 2));
    expect(measure(flux)).toEqual(measure(flux));
  });

  it('refuses a spectrum of exact zeros: no detector reads exactly zero everywhere', () => {
    expect(() => measure(new Float64Array(wavelength.length))).toThrow(/no-usable-pixels/);
  });

  it('asks for a look when all flux is negative', () => {
    const answer = measure(new Float64Array(wavelength.length).fill(-5));
    expect(answer.needsReview).toBe(true);
  });

  it('refuses, with the row, a spectrum whose pixels are all masked', () => {
    const masked = flatSpectrum(new Float64Array(wavelength.length).fill(NaN));
    expect(() => measureSpectrum(masked, NO_EXPOSURE_CONTEXT, library, DEFAULT_MEASURING_OPTIONS)).toThrow(
      /row 7.*no-usable-pixels/,
    );
  });

  it('returns only finite numbers or null, and probabilities that sum to one', () => {
    const answer = measure(wavelength.map((w) => 5 + 3 * Math.exp(-0.5 * ((w - 5600) / 3) ** 2)));
    for (const [name, value] of Object.entries(answer)) {
      if (typeof value === 'number') expect(Number.isFinite(value), name).toBe(true);
    }
    const { probabilityGalaxy, probabilityQuasar, probabilityStar, probabilityNone } = answer;
    expect(probabilityGalaxy + probabilityQuasar + probabilityStar + probabilityNone).toBeCloseTo(1, 9);
  });
});
