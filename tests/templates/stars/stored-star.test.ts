import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { describe, expect, it } from 'vitest';
import { starsFromFile } from '../../../templates/prepare/file-contents.ts';
import { assembleLines } from '../../../templates/physics/tables.ts';
import { STAR_GRID, starNamed } from '../../../templates/stars/parameters.ts';
import { rebuildModel, toStoredStar } from '../../../templates/stars/stored-star.ts';
import { starFamilyFile } from '../../../templates/stars/star-family-file.ts';
import { STORED_GRID } from '../../../templates/stars/stored-grid.ts';
import { printSkipReason, sharedPath } from '../../support/shared-data.ts';
import { BUNDLED_TABLES, BUNDLED_TEXTS } from '../physics/bundled-tables.ts';

const FAMILY = resolve(import.meta.dirname, '../../../templates/families/stars.fits');
const LIST = sharedPath('design', 'checks', 'lines_lite.csv');
if (LIST === null) {
  printSkipReason('the list of atomic lines');
}

describe('toStoredStar', () => {
  it('splits a spectrum into mean and shape', () => {
    const stored = toStoredStar(starNamed('dwarf 5777 4.5 +0.0'), Float32Array.of(2, 4, 6));
    expect(stored.scale).toBe(4);
    expect([...stored.flux]).toEqual([0.5, 1, 1.5]);
  });
});

describe('starFamilyFile', () => {
  it('comes back from the file as it was: names, parameters, scales, spectra', () => {
    const flux = Float32Array.from({ length: STORED_GRID.length }, (_, i) => 1 + (i % 7));
    const stars = [STAR_GRID[3]!, STAR_GRID[115]!].map((parameters) => toStoredStar(parameters, flux));
    const { grid, models } = starsFromFile(starFamilyFile(stars));
    expect(grid.length).toBe(STORED_GRID.length);
    expect(grid.lnStart).toBeCloseTo(STORED_GRID.lnStart, 12);
    expect(grid.step / STORED_GRID.step).toBeCloseTo(1, 12);
    for (const [i, model] of models.entries()) {
      expect(model.name).toBe(stars[i]!.parameters.name);
      expect(model.group).toBe(stars[i]!.parameters.group);
      expect(model.temperature).toBe(stars[i]!.parameters.effectiveTemperature);
      expect(model.scale).toBe(stars[i]!.scale);
      expect(model.flux).toEqual(stars[i]!.flux);
    }
  });
});

describe('the committed family', () => {
  const { models } = starsFromFile(readFileSync(FAMILY));

  it('holds every star of the grid, finite, never negative, with mean 1', () => {
    expect(models.map(({ name }) => name)).toEqual(STAR_GRID.map(({ name }) => name));
    for (const { flux } of models) {
      expect(flux.every((value) => Number.isFinite(value) && value >= 0)).toBe(true);
      expect(flux.reduce((sum, value) => sum + value, 0) / flux.length).toBeCloseTo(1, 4);
    }
  });

  it.skipIf(LIST === null)('is what the code computes: a white dwarf again, within 1e-5', () => {
    const name = 'white-dwarf 20000 8.0 -4.0';
    const again = rebuildModel(
      name,
      BUNDLED_TABLES,
      assembleLines(readFileSync(LIST!, 'utf8'), BUNDLED_TEXTS),
    );
    const stored = models.find((model) => model.name === name)!;
    // Another machine may round exp and pow differently in the last digit.
    expect(Math.abs(again.scale / stored.scale - 1)).toBeLessThan(1e-5);
    const worst = again.flux.reduce(
      (most, value, i) => Math.max(most, Math.abs(value / stored.flux[i]! - 1)),
      0,
    );
    expect(worst).toBeLessThan(1e-5);
  });
});
