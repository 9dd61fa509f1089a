import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  assembleLines,
  parseTables,
  type PhysicsTables,
  type StarLines,
  TABLE_FILES,
  type TableTexts,
} from '../templates/physics/tables.ts';
import { STAR_GRID } from '../templates/stars/parameters.ts';
import { starFamilyFile } from '../templates/stars/star-family-file.ts';
import { rebuildModel } from '../templates/stars/stored-star.ts';
import { familyFolder } from '../worker/recipe.ts';

/** Tables and lines every star needs. @throws RangeError when the list is malformed */
export function starInputs(lineList: string): { tables: PhysicsTables; lines: StarLines } {
  const folder = join(familyFolder(), '..', 'data');
  const texts = Object.fromEntries(
    Object.entries(TABLE_FILES).map(([key, file]) => [key, readFileSync(join(folder, file), 'utf8')]),
  ) as TableTexts;
  return { tables: parseTables(texts), lines: assembleLines(lineList, texts) };
}

/**
 * Every star of the grid, one after the other in this thread: about ten minutes.
 *
 * @param lineList text of the list of atomic lines
 * @param report told after each star
 * @returns bytes of `stars.fits`
 */
export function synthesizeStars(lineList: string, report: (line: string) => void): Uint8Array {
  const { tables, lines } = starInputs(lineList);
  const stars = STAR_GRID.map(({ name }, k) => {
    const star = rebuildModel(name, tables, lines);
    report(`${k + 1}/${STAR_GRID.length} ${name}`);
    return star;
  });
  return starFamilyFile(stars);
}
