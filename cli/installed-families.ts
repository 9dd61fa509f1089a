import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { type FamilyLibrary, loadFamilyLibrary } from '../templates/index.ts';
import { FAMILY_FILES, familyFolder } from '../worker/recipe.ts';

/** Bytes of one installed family file. @throws Error when it cannot be read */
export function installedFile(name: string): Uint8Array {
  return new Uint8Array(readFileSync(join(familyFolder(), name)));
}

/** The library of the installed family files. @throws Error when one cannot be read, InputFault when malformed */
export function installedLibrary(): FamilyLibrary {
  return loadFamilyLibrary({
    stars: installedFile(FAMILY_FILES.stars),
    populations: installedFile(FAMILY_FILES.populations),
    quasars: installedFile(FAMILY_FILES.quasars),
  });
}
