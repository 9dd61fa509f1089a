import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { starsFromFile } from '../../../templates/prepare/file-contents.ts';
import { listedToVacuum } from '../../../templates/physics/refraction.ts';
import { STORED_GRID } from '../../../templates/stars/stored-grid.ts';

/** Band, blue and red sideband of an index, air angstrom: Trager et al. 1998; Worthey & Ottaviani 1997. */
const INDICES = {
  G4300: [4281.375, 4316.375, 4266.375, 4282.625, 4318.875, 4335.125],
  Hbeta: [4847.875, 4876.625, 4827.875, 4847.875, 4876.625, 4891.625],
  Mgb: [5160.125, 5192.625, 5142.625, 5161.375, 5191.375, 5206.375],
  NaD: [5876.875, 5909.375, 5860.625, 5875.625, 5922.125, 5948.125],
  HdeltaA: [4083.5, 4122.25, 4041.6, 4079.75, 4128.5, 4161.0],
} as const;

/** Resolution of the library of Pickles 1998, sigma in stored pixels: R = 500. */
const LIBRARY_SIGMA = 255 / (STORED_GRID.step * 299792.458);

let spectra = new Map<string, Float64Array>();

function smooth(flux: Float32Array): Float64Array {
  const reach = Math.ceil(4 * LIBRARY_SIGMA);
  return Float64Array.from(flux, (_, i) => {
    let sum = 0;
    let weight = 0;
    for (let k = Math.max(-reach, -i); k <= Math.min(reach, flux.length - 1 - i); k += 1) {
      const w = Math.exp(-0.5 * (k / LIBRARY_SIGMA) ** 2);
      sum += w * flux[i + k]!;
      weight += w;
    }
    return sum / weight;
  });
}

const pixelOf = (air: number): number =>
  Math.round((Math.log(listedToVacuum(air)) - STORED_GRID.lnStart) / STORED_GRID.step);

/** Mean of a function of pixel and flux between two air wavelengths. */
function meanOver(
  flux: Float64Array,
  from: number,
  to: number,
  of: (value: number, pixel: number) => number = (value) => value,
): number {
  const first = pixelOf(from);
  const last = pixelOf(to);
  let sum = 0;
  for (let i = first; i < last; i += 1) {
    sum += of(flux[i]!, i);
  }
  return sum / (last - first);
}

/** Equivalent width in angstrom of an index of a star. */
function index(star: string, name: keyof typeof INDICES): number {
  const flux = spectra.get(star)!;
  const [low, high, blueLow, blueHigh, redLow, redHigh] = INDICES[name];
  const blue = meanOver(flux, blueLow, blueHigh);
  const red = meanOver(flux, redLow, redHigh);
  const blueAt = pixelOf(0.5 * (blueLow + blueHigh));
  const redAt = pixelOf(0.5 * (redLow + redHigh));
  const continuum = (i: number): number => blue + ((red - blue) * (i - blueAt)) / (redAt - blueAt);
  return meanOver(flux, low, high, (value, i) => 1 - value / continuum(i)) * (high - low);
}

/** Break at 4000 angstrom, mean flux per frequency of 4000-4100 over 3850-3950 (Balogh et al. 1999). */
function break4000(star: string): number {
  const flux = spectra.get(star)!;
  const perFrequency = (value: number, i: number): number => value * Math.exp(2 * i * STORED_GRID.step);
  return meanOver(flux, 4000, 4100, perFrequency) / meanOver(flux, 3850, 3950, perFrequency);
}

const SUN = 'dwarf 5777 4.5 +0.0';

beforeAll(() => {
  const file = resolve(import.meta.dirname, '../../../templates/families/stars.fits');
  const { models } = starsFromFile(readFileSync(file));
  const wanted = models.filter(({ group, metallicity }) => group === 'dwarf' && metallicity === 0);
  spectra = new Map(wanted.map(({ name, flux }) => [name, smooth(flux)]));
});

describe('the star family against the library of Pickles 1998 (PASP 110, 863)', () => {
  // Measured on the library with the same definitions. Tolerances: 15 per cent for the break, 25 for Balmer lines of
  // A to F stars, 30 for metal lines: the library mixes stars of a type and the list has 4,500 lines.
  it.each([
    [SUN, 'G2 V', 1.729],
    ['dwarf 6500 4.2 +0.0', 'F5 V', 1.358],
    ['dwarf 9500 4.2 +0.0', 'A0 V', 1.188],
    ['dwarf 5000 4.5 +0.0', 'K2 V', 2.46],
  ])('gives %s the break at 4000 A of a %s star', (star, _, published) => {
    expect(Math.abs(break4000(star) / published - 1)).toBeLessThan(0.15);
  });

  it.each([
    [SUN, 'G2 V', 'G4300', 5.288, 0.3],
    [SUN, 'G2 V', 'Hbeta', 2.565, 0.25],
    [SUN, 'G2 V', 'Mgb', 3.097, 0.3],
    [SUN, 'G2 V', 'NaD', 1.316, 0.3],
    ['dwarf 6500 4.2 +0.0', 'F5 V', 'Hbeta', 3.547, 0.25],
    ['dwarf 9500 4.2 +0.0', 'A0 V', 'Hbeta', 8.072, 0.25],
    ['dwarf 9500 4.2 +0.0', 'A0 V', 'HdeltaA', 13.244, 0.25],
    ['dwarf 12000 4.2 +0.0', 'B9 V', 'Hbeta', 6.496, 0.25],
    ['dwarf 12000 4.2 +0.0', 'B9 V', 'HdeltaA', 9.569, 0.25],
    ['dwarf 3500 4.8 +0.0', 'M2 V', 'NaD', 9.954, 0.3],
  ] as const)('gives %s, as %s, its index %s', (star, _, name, published, tolerance) => {
    expect(Math.abs(index(star, name) / published - 1)).toBeLessThan(tolerance);
  });

  it('has its Balmer maximum at 9000-9500 K and the break rising from F to K', () => {
    const balmer = [6500, 7500, 8500, 9500, 12000, 15000, 30000].map((t) =>
      index(`dwarf ${t} 4.2 +0.0`, 'HdeltaA'),
    );
    expect(balmer.indexOf(Math.max(...balmer))).toBe(3);
    const breaks = ['6500 4.2', '6000 4.5', '5777 4.5', '5500 4.5', '5000 4.5', '4500 4.5'].map((p) =>
      break4000(`dwarf ${p} +0.0`),
    );
    expect(breaks).toEqual([...breaks].sort((a, b) => a - b));
  });
});
