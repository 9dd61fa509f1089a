import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { MeasuringOptions } from '../config/measuring.ts';
import { RECIPE_VERSION } from '../pipeline/index.ts';
import { byCodeUnit } from '../store/index.ts';
import { PREPARATION_VERSION } from '../templates/library.ts';

/** Everything the numbers of a row depend on, besides the input's bytes. */
export interface Recipe {
  readonly measuring: MeasuringOptions;
  /** The input profile as given; null when layouts are recognised. */
  readonly profile: unknown;
  /** sha256 over the family files. */
  readonly families: string;
  readonly version: number;
}

/** The recipe in force for these options; `version` is raised with every change of numbers. */
export function recipeOf(measuring: MeasuringOptions, profile: unknown, families: string): Recipe {
  return { measuring, profile, families, version: RECIPE_VERSION };
}

/** sha256 (lower-case hexadecimal) of the recipe's canonical JSON. */
export function recipeHash(recipe: Recipe): string {
  return createHash('sha256').update(canonicalJson(recipe)).digest('hex');
}

/** JSON with the keys of every object in code-unit order and no spaces: equal values give equal text. */
export function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  if (typeof value === 'object' && value !== null) {
    const entries = Object.entries(value)
      .filter(([, inner]) => inner !== undefined)
      .sort(byCodeUnit(([key]) => key));
    return `{${entries.map(([key, inner]) => `${JSON.stringify(key)}:${canonicalJson(inner)}`).join(',')}}`;
  }
  return JSON.stringify(value);
}

/** Names of the family files in their folder. */
export const FAMILY_FILES = {
  stars: 'stars.fits',
  populations: 'populations.fits',
  quasars: 'quasars.fits',
} as const;

/** Where the family files are installed: beside the program's own code, or above its compiled form. */
export function familyFolder(): string {
  const beside = new URL('../templates/families/', import.meta.url);
  const above = new URL('../../templates/families/', import.meta.url);
  return fileURLToPath(existsSync(beside) ? beside : above);
}

/**
 * One hash over the family files and the version of their preparation.
 *
 * @throws Error when a file cannot be read
 */
export function familyFilesHash(directory: string): string {
  const hash = createHash('sha256').update(`preparation ${PREPARATION_VERSION}`);
  for (const name of Object.values(FAMILY_FILES)) {
    hash.update(
      createHash('sha256')
        .update(readFileSync(join(directory, name)))
        .digest(),
    );
  }
  return hash.digest('hex');
}
