import { existsSync } from 'node:fs';
import { join } from 'node:path';
import {
  buildPopulations,
  buildQuasars,
  FAMILY_FILE_NAMES,
  type Manifest,
  manifestDisagreements,
} from '../templates/index.ts';
import { starsFromFile } from '../templates/prepare/file-contents.ts';
import { sha256 } from '../templates/prepare/sha256.ts';
import { rebuildModel } from '../templates/stars/stored-star.ts';
import { familyFolder } from '../worker/recipe.ts';
import { LINE_LIST } from './derived-families.ts';
import { installedFile } from './installed-families.ts';
import { starInputs } from './star-synthesis.ts';

/** Stars computed again when a line list is at hand: one cool enough for molecules, one hot. */
const SAMPLE = ['dwarf 4500 4.5 +0.0', 'dwarf 9500 4.2 +0.0'];
/** Largest relative difference of a pixel: stored numbers have 24 bits, exp and log differ in the last bits. */
const TOLERANCE = 1e-5;

/**
 * Compares the installed family files with their manifest and with what the code makes today.
 *
 * @param lineList text of the list they were made from; null: only populations are rebuilt
 * @param report told what is being compared
 * @returns one sentence per disagreement
 */
export function verifyFamilies(lineList: string | null, report: (line: string) => void): string[] {
  const present = FAMILY_FILE_NAMES.filter((name) => existsSync(join(familyFolder(), name)));
  const files = Object.fromEntries(present.map((name) => [name, installedFile(name)]));
  const manifest = JSON.parse(new TextDecoder().decode(installedFile('manifest.json'))) as Manifest;
  report('files against manifest');
  const found = manifestDisagreements(manifest, files);
  const stars = files['stars.fits'];
  if (!stars) return found;
  report('populations against stars');
  if (sha256(buildPopulations(stars)) !== manifest.files['populations.fits'].sha256) {
    found.push('populations.fits must be what the stars give, it differs');
  }
  if (lineList === null) return found;
  report('line list against manifest');
  if (sha256(new TextEncoder().encode(lineList)) !== manifest.inputs[LINE_LIST]?.sha256) {
    found.push('the line list must be the one in the manifest, it differs');
    return found;
  }
  report('quasars against line list');
  if (sha256(buildQuasars(lineList)) !== manifest.files['quasars.fits'].sha256) {
    found.push('quasars.fits must be what the line list gives, it differs');
  }
  return [...found, ...starDisagreements(stars, lineList, report)];
}

function starDisagreements(stars: Uint8Array, lineList: string, report: (line: string) => void): string[] {
  const { models } = starsFromFile(stars);
  const { tables, lines } = starInputs(lineList);
  return SAMPLE.flatMap((name) => {
    report(`${name} against physics`);
    const stored = models.find((model) => model.name === name);
    if (!stored) return [`stars.fits must hold ${name}, it is missing`];
    const { flux } = rebuildModel(name, tables, lines);
    let worst = 0;
    flux.forEach((value, i) => {
      worst = Math.max(worst, Math.abs(value / stored.flux[i]! - 1));
    });
    return worst <= TOLERANCE ? [] : [`${name} must agree within ${TOLERANCE}, differs by ${worst}`];
  });
}
