import { POPULATIONS } from './galaxies/population.ts';
import { PREPARATION_VERSION } from './library.ts';
import { sha256 } from './prepare/sha256.ts';
import { DRAW_SEED, DRAWS, VECTORS_PER_WINDOW, WINDOWS } from './quasars/windows.ts';

/** Names of the family files, in the order the library hashes them. */
export const FAMILY_FILE_NAMES = ['stars.fits', 'populations.fits', 'quasars.fits'] as const;
export type FamilyFileName = (typeof FAMILY_FILE_NAMES)[number];

/** What is known of one file. */
export interface FileRecord {
  readonly sha256: string;
  readonly bytes: number;
}

/** How the committed family files came to be. */
export interface Manifest {
  /** Version of the code that prepares families from the files. */
  readonly preparationVersion: number;
  /** What the files were made from; the line list is not bundled. */
  readonly inputs: Readonly<Record<string, FileRecord>>;
  readonly files: Readonly<Record<FamilyFileName, FileRecord>>;
  /** The choices behind the numbers, as the code had them. */
  readonly parameters: {
    readonly populations: readonly string[];
    readonly quasarDraws: number;
    readonly quasarSeed: number;
    readonly vectorsPerWindow: number;
    readonly quasarWindows: readonly (readonly [from: number, to: number])[];
  };
  /** Published work the numbers rest on; each is cited again at its formula. */
  readonly sources: readonly string[];
}

const SOURCES = [
  'Atomic lines: Kurucz and laboratory gf values, list given to `templates build --lines` (not bundled)',
  'Partition functions and equilibrium constants: Barklem & Collet 2016, A&A 588, A96',
  'Solar abundances: Asplund et al. 2009, ARA&A 47, 481',
  'Initial mass function: Kroupa 2001, MNRAS 322, 231',
  'Main sequence: after Pecaut & Mamajek 2013, ApJS 208, 9',
  'Attenuation in galaxies: Calzetti et al. 2000, ApJ 533, 682',
  'Galactic extinction: Cardelli, Clayton & Mathis 1989, ApJ 345, 245; O’Donnell 1994, ApJ 422, 158',
  'Intergalactic hydrogen: Madau 1995, ApJ 441, 18',
  'Balmer decrement: Storey & Hummer 1995, MNRAS 272, 41',
  'Forbidden-line ratios: Storey & Zeippen 2000, MNRAS 312, 813; NIST Atomic Spectra Database',
  'Ultraviolet lines of galaxies: Shapley et al. 2003, ApJ 588, 65; Martin et al. 2012, ApJ 760, 127',
  'Quasar lines: Vanden Berk et al. 2001, AJ 122, 549',
  'Balmer continuum: Grandi 1982, ApJ 255, 25',
];

/** The record of one file's bytes. */
export function recordOf(bytes: Uint8Array): FileRecord {
  return { sha256: sha256(bytes), bytes: bytes.length };
}

/** The manifest of files made by this version of the code from these inputs. */
export function manifestOf(
  files: Readonly<Record<FamilyFileName, Uint8Array>>,
  inputs: Readonly<Record<string, Uint8Array>>,
): Manifest {
  const records = (entries: Readonly<Record<string, Uint8Array>>): Record<string, FileRecord> =>
    Object.fromEntries(Object.entries(entries).map(([name, bytes]) => [name, recordOf(bytes)]));
  return {
    preparationVersion: PREPARATION_VERSION,
    inputs: records(inputs),
    files: records(files) as Record<FamilyFileName, FileRecord>,
    parameters: {
      populations: POPULATIONS.map(({ name }) => name),
      quasarDraws: DRAWS,
      quasarSeed: DRAW_SEED,
      vectorsPerWindow: VECTORS_PER_WINDOW,
      quasarWindows: WINDOWS.map(({ from, to }) => [from, to] as const),
    },
    sources: SOURCES,
  };
}

/**
 * What does not agree between a manifest and the files it describes.
 *
 * @param files bytes by name; a name that is absent counts as a missing file
 * @returns one sentence per disagreement; empty when all agree
 */
export function manifestDisagreements(
  manifest: Manifest,
  files: Readonly<Partial<Record<FamilyFileName, Uint8Array>>>,
): string[] {
  const found: string[] = [];
  if (manifest.preparationVersion !== PREPARATION_VERSION) {
    found.push(`preparation version must be ${PREPARATION_VERSION}, got ${manifest.preparationVersion}`);
  }
  for (const name of FAMILY_FILE_NAMES) {
    const bytes = files[name];
    const stated = manifest.files[name];
    if (!bytes) {
      found.push(`${name} must be there, it is missing`);
      continue;
    }
    const actual = recordOf(bytes);
    if (actual.sha256 !== stated.sha256) {
      found.push(`${name} must have sha256 ${stated.sha256}, got ${actual.sha256}`);
    }
  }
  return found;
}
