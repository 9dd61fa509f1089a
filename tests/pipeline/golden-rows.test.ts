import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import {
  bytesInMemory,
  DEFAULT_READ_LIMITS,
  openInput,
  readSpectra,
  recogniseLayout,
} from '../../pipeline/decode/index.ts';
import { InputFault } from '../../pipeline/errors.ts';
import { exposureContext } from '../../pipeline/grid/index.ts';
import { measureSpectrum, RECIPE_VERSION } from '../../pipeline/index.ts';
import { barycentricVelocityKmS } from '../../pipeline/measure/index.ts';
import { encodeExposure, HARROW_FELL, makersFrom, simulateNights } from '../../simulate/index.ts';
import { loadFamilyLibrary } from '../../templates/library.ts';
import { starsFromFile } from '../../templates/prepare/file-contents.ts';

/**
 * Rows of one small practice exposure as this recipe measures them. They do not say that the numbers are right
 * (other tests do); they say that the numbers did not move unnoticed. After a change that is meant to move
 * them, raise RECIPE_VERSION and write the file anew: SHIFTWORK_WRITE_GOLDEN=1 npx vitest run golden-rows
 */
const GOLDEN = new URL('./golden-rows.json', import.meta.url);
const SEED = 515;
const FIBRES = 10;

interface Golden {
  readonly recipeVersion: number;
  readonly familiesHash: string;
  readonly rows: readonly GoldenRow[];
}

interface GoldenRow {
  readonly row: number | null;
  readonly kind: string | null;
  readonly family: string | null;
  readonly redshift: number | null;
  readonly chiSquare: number | null;
  readonly confidence: number;
  readonly reasons: string;
}

const file = (name: string): Uint8Array =>
  readFileSync(new URL(`../../templates/families/${name}`, import.meta.url));

function measureNow(): Golden {
  const library = loadFamilyLibrary({
    stars: file('stars.fits'),
    populations: file('populations.fits'),
    quasars: file('quasars.fits'),
  });
  const nights = simulateNights(
    { seed: SEED, nights: 1, fields: 1, fibres: FIBRES },
    makersFrom(starsFromFile(file('stars.fits'))),
    (mjd, ra, dec) => barycentricVelocityKmS(mjd, HARROW_FELL, ra, dec),
  );
  const { exposure } = nights.next().value!;
  const bytes = Uint8Array.from([...encodeExposure(exposure)].flatMap((chunk) => [...chunk]));
  const input = openInput(bytesInMemory('golden.fits', bytes), DEFAULT_READ_LIMITS);
  const layout = recogniseLayout(input);
  const read = readSpectra(input, layout, 0, layout.rowCount);
  const spectra = read.flatMap((one) => (one instanceof InputFault ? [] : [one]));
  const context = exposureContext(spectra.filter(({ role }) => role === 'sky'));
  const rows = spectra.map((spectrum): GoldenRow => {
    const { answer } = measureSpectrum(spectrum, context, library, DEFAULT_MEASURING_OPTIONS);
    const { kind, family, redshift, chiSquare, confidence } = answer;
    const reasons = answer.reasons.map(({ word }) => word).join(' ');
    return { row: spectrum.inputRow, kind, family, redshift, chiSquare, confidence, reasons };
  });
  return { recipeVersion: RECIPE_VERSION, familiesHash: library.hash, rows };
}

/** Sums in another order may differ in the last digits between processors; nothing else may. */
function same(a: number | null, b: number | null, tolerance: number): boolean {
  return a === b || (a !== null && b !== null && Math.abs(a - b) <= tolerance * Math.max(1, Math.abs(b)));
}

describe('the recipe', () => {
  it(`measures a practice exposure of ${FIBRES} fibres as recorded, or its version is raised (seed ${SEED})`, () => {
    const now = measureNow();
    const known = existsSync(GOLDEN) ? (JSON.parse(readFileSync(GOLDEN, 'utf8')) as Golden) : null;
    const moved =
      known?.rows.filter((old, i) => {
        const row = now.rows[i];
        return (
          row?.kind !== old.kind ||
          row.family !== old.family ||
          row.reasons !== old.reasons ||
          !same(row.redshift, old.redshift, 1e-7) ||
          !same(row.chiSquare, old.chiSquare, 1e-5) ||
          !same(row.confidence, old.confidence, 1e-5)
        );
      }) ?? [];
    if (process.env['SHIFTWORK_WRITE_GOLDEN'] === '1') {
      const sameVersion =
        known?.recipeVersion === now.recipeVersion && known.familiesHash === now.familiesHash;
      expect(moved.length > 0 && sameVersion, 'numbers moved: raise RECIPE_VERSION first').toBe(false);
      writeFileSync(GOLDEN, `${JSON.stringify(now, null, 2)}\n`);
      return;
    }
    expect(known, 'golden-rows.json is missing').not.toBeNull();
    expect(now.rows).toHaveLength(known!.rows.length);
    expect(known!.recipeVersion).toBe(now.recipeVersion);
    expect(known!.familiesHash).toBe(now.familiesHash);
    expect(moved, 'numbers moved without a new RECIPE_VERSION').toEqual([]);
  });
});
