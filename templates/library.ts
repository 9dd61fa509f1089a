import type { Family } from './family.ts';
import { distantGalaxyFamilies, prepareDistantGalaxies } from './galaxies/distant-families.ts';
import { galaxyFamilies, prepareGalaxies } from './galaxies/galaxy-families.ts';
import { populationsFromFile, quasarsFromFile, starsFromFile } from './prepare/file-contents.ts';
import { sha256 } from './prepare/sha256.ts';
import { prepareStars, starFamilies } from './prepare/star-families.ts';
import { quasarFamilies } from './quasars/quasar-families.ts';

/** Every family, prepared for a line spread on demand and kept. */
export interface FamilyLibrary {
  /** sha256 over the family files and the recipe version of the preparation. */
  readonly hash: string;
  /**
   * Families broadened to an instrument whose Gaussian line spread has this sigma (km/s, typical over the
   * spectrum). Requests are rounded to 5 per cent steps so that few versions exist; the last few are kept.
   *
   * @throws RangeError when the line spread is not a positive number
   */
  familiesFor(lineSpreadSigmaKmS: number): readonly Family[];
}

/** The bytes of the family files. */
export interface FamilyFiles {
  readonly stars: Uint8Array;
  readonly populations: Uint8Array;
  readonly quasars: Uint8Array;
}

/** Raised with every change of the preparation that moves a number: part of the library's hash. */
export const PREPARATION_VERSION = 3;

/** Line spreads are rounded to powers of this. */
const LINE_SPREAD_STEP = 1.05;
/** Versions kept, of about 25 MB each: a night has one or two instruments. */
const KEPT_VERSIONS = 4;

/**
 * Opens the family files. What does not depend on a line spread is worked out here (under a second); the first
 * request for a line spread prepares its families (about another), later ones are free.
 *
 * @throws InputFault when a file is not a family file
 */
export function loadFamilyLibrary(files: FamilyFiles): FamilyLibrary {
  const populations = populationsFromFile(files.populations);
  const quasars = quasarsFromFile(files.quasars);
  const stars = prepareStars(starsFromFile(files.stars));
  const galaxies = prepareGalaxies(populations);
  const distant = prepareDistantGalaxies(populations);
  const versions = new Map<number, readonly Family[]>();
  return {
    hash: libraryHash(files),
    familiesFor(lineSpreadSigmaKmS) {
      if (!(lineSpreadSigmaKmS > 0 && lineSpreadSigmaKmS < Infinity)) {
        throw new RangeError(`lineSpreadSigmaKmS must be a positive number, got ${lineSpreadSigmaKmS}`);
      }
      const step = Math.round(Math.log(lineSpreadSigmaKmS) / Math.log(LINE_SPREAD_STEP));
      const rounded = LINE_SPREAD_STEP ** step;
      const families = versions.get(step) ?? [
        ...starFamilies(stars, rounded),
        ...galaxyFamilies(galaxies, rounded),
        ...distantGalaxyFamilies(distant, rounded),
        ...quasarFamilies(quasars, populations, rounded),
      ];
      // Re-inserting moves it to the end: the first key is the one unused for longest.
      versions.delete(step);
      versions.set(step, families);
      if (versions.size > KEPT_VERSIONS) versions.delete(versions.keys().next().value!);
      return families;
    },
  };
}

/** One hash over the hashes of the files and the version of the preparation. */
function libraryHash({ stars, populations, quasars }: FamilyFiles): string {
  const parts = [stars, populations, quasars].map(sha256);
  const text = [...parts, `preparation ${PREPARATION_VERSION}`].join('\n');
  return sha256(Uint8Array.from(text, (letter) => letter.charCodeAt(0)));
}
