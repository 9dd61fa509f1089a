import { beforeAll, describe, expect, it } from 'vitest';
import { InputFault } from '../../pipeline/errors.ts';
import type { Component, Family } from '../../templates/family.ts';
import { type FamilyFiles, type FamilyLibrary, loadFamilyLibrary } from '../../templates/library.ts';
import { rootMeanSquare } from '../../templates/prepare/unit-rows.ts';
import { installedBytes } from './installed-files.ts';

const files = (): FamilyFiles => ({
  stars: installedBytes('stars.fits'),
  populations: installedBytes('populations.fits'),
  quasars: installedBytes('quasars.fits'),
});

describe('loadFamilyLibrary()', () => {
  let library: FamilyLibrary;
  let families: readonly Family[];
  beforeAll(() => {
    library = loadFamilyLibrary(files());
    families = library.familiesFor(60);
  });
  const familyNamed = (name: string, from = families): Family => from.find((family) => family.name === name)!;
  const componentsOf = (family: Family): readonly Component[] =>
    family.componentsAt(0.5 * (family.redshiftMin + family.redshiftMax));

  it('offers seven stellar, five galaxy and eight quasar families, each named once', () => {
    const counts = { star: 7, galaxy: 5, quasar: 8 };
    for (const [kind, count] of Object.entries(counts)) {
      expect(families.filter((family) => family.kind === kind).length).toBe(count);
    }
    expect(new Set(families.map(({ name }) => name)).size).toBe(families.length);
  });

  it('gives every family 2 to 10 finite unit-rms search vectors on its grid', () => {
    for (const { basis, grid } of families) {
      expect(basis.length).toBeGreaterThanOrEqual(2);
      expect(basis.length).toBeLessThanOrEqual(10);
      for (const vector of basis) {
        expect(vector.length).toBe(grid.length);
        expect(vector.every(Number.isFinite)).toBe(true);
        expect(rootMeanSquare(vector)).toBeCloseTo(1, 4);
      }
    }
  });

  it('gives every component light that is finite, not negative and zero exactly outside first..end', () => {
    for (const family of families) {
      for (const { flux, first, end } of componentsOf(family)) {
        expect(flux.length).toBe(family.componentGrid.length);
        expect(end).toBeGreaterThan(first);
        expect(flux[first]).not.toBe(0);
        expect(flux[end - 1]).not.toBe(0);
        expect(flux.every((value, i) => value >= 0 && (value === 0 || (i >= first && i < end)))).toBe(true);
      }
    }
  });

  it('labels the components of a family once each', () => {
    for (const family of families) {
      const labels = componentsOf(family).map(({ label }) => label);
      expect(new Set(labels).size).toBe(labels.length);
    }
  });

  it('lays search pixels over pairs of component pixels', () => {
    for (const { grid, componentGrid } of families) {
      expect(grid.step / componentGrid.step).toBeCloseTo(2, 12);
      expect((grid.lnStart - componentGrid.lnStart) / componentGrid.step).toBeCloseTo(0.5, 6);
    }
  });

  it('draws narrow lines as wide as line spread and 60 km/s make in quadrature', () => {
    for (const lineSpread of [60, 220]) {
      // The library rounds line spreads to 5 per cent steps.
      const rounded = 1.05 ** Math.round(Math.log(lineSpread) / Math.log(1.05));
      const family = familyNamed('galaxy-narrow', library.familiesFor(lineSpread));
      const { flux, first, end } = componentsOf(family).find(({ label }) => label === 'argon3 narrow')!;
      let sum = 0;
      let mean = 0;
      let square = 0;
      for (let i = first; i < end; i++) {
        const energy = flux[i]! * Math.exp(i * family.componentGrid.step);
        sum += energy;
        mean += energy * i;
        square += energy * i * i;
      }
      const stepKmS = family.componentGrid.step * 299_792.458;
      const width = Math.sqrt(square / sum - (mean / sum) ** 2) * stepKmS;
      const expected = Math.sqrt(60 ** 2 + rounded ** 2 + stepKmS ** 2 / 12);
      expect(Math.abs(width / expected - 1)).toBeLessThan(2e-3);
    }
  });

  it('makes stellar lines shallower, not weaker, with a wider line spread', () => {
    const depth = (lineSpread: number): { deepest: number; area: number } => {
      const family = familyNamed('star-a', library.familiesFor(lineSpread));
      const { flux } = componentsOf(family).find(({ label }) => label.endsWith('av0'))!;
      const { lnStart, step } = family.componentGrid;
      const pixel = (wavelength: number): number => Math.round((Math.log(wavelength) - lnStart) / step);
      const part = flux.subarray(pixel(4700), pixel(5030));
      const sum = part.reduce((total, value) => total + value, 0);
      return { deepest: Math.min(...part), area: sum };
    };
    const sharp = depth(60);
    const wide = depth(220);
    expect(wide.deepest).toBeGreaterThan(sharp.deepest);
    expect(Math.abs(wide.area / sharp.area - 1)).toBeLessThan(2e-3);
  });

  it('keeps what it prepared, and shares it between line spreads that round alike', () => {
    expect(library.familiesFor(60)).toBe(families);
    expect(library.familiesFor(60.4)).toBe(families);
    expect(library.familiesFor(220)).not.toBe(families);
  });

  it('refits both galaxy families, and all quasar windows, with one set of components', () => {
    expect(familyNamed('galaxy-narrow').componentsAt(0.3)).toBe(familyNamed('galaxy-wide').componentsAt(0.3));
    expect(familyNamed('quasar-0.0').componentsAt(1)).toBe(familyNamed('quasar-1.9').componentsAt(1));
  });

  it('has another hash when one byte of one file is another', () => {
    const changed = files().quasars.slice();
    // The last block ends in padding: one digit there does not stop the file from being read.
    changed[changed.length - 1] = 1;
    const other = loadFamilyLibrary({ ...files(), quasars: changed }).hash;
    expect(other).toMatch(/^[0-9a-f]{64}$/);
    expect(other).not.toBe(library.hash);
  });

  it('refuses a line spread that is not a positive number and files that are not family files', () => {
    for (const sigma of [0, -1, NaN, Infinity]) expect(() => library.familiesFor(sigma)).toThrow(RangeError);
    expect(() => loadFamilyLibrary({ ...files(), stars: installedBytes('populations.fits') })).toThrow(
      InputFault,
    );
    expect(() => loadFamilyLibrary({ ...files(), quasars: new Uint8Array() })).toThrow(InputFault);
  });
});
