import { mkdir } from 'node:fs/promises';
import { join } from 'node:path';
import { asciiText } from '../pipeline/encode/index.ts';
import type { CardSpec } from '../pipeline/encode/index.ts';
import type { NightFacts, NightReader } from '../store/night-reader.ts';
import { catalogueCsv } from './catalogue/csv.ts';
import { catalogueFits } from './catalogue/fits.ts';
import { catalogueParquet } from './catalogue/parquet.ts';
import { inCatalogueOrder } from './catalogue/row-order.ts';
import { catalogueVotable } from './catalogue/votable.ts';
import { nightPage, PLOT_LIMITS } from './page/night-page.ts';
import type { PlotLimits } from './page/flagged-section.ts';
import { pageAssets } from './page/page-assets.ts';
import { runRecord } from './run-record.ts';
import { writeAtomically } from './write-atomically.ts';

/**
 * Writes everything a night leaves behind: the catalogue in four formats, `run.json` and `report.html`.
 * Files that exist are replaced one by one, each whole.
 *
 * @param directory made when absent
 * @param limits how many plots the report may carry
 * @returns paths of the files written
 * @throws the system's error (ENOSPC, EACCES ...) when a file cannot be written; those written before stay
 */
export async function writeNightOutputs(
  reader: NightReader,
  directory: string,
  limits: PlotLimits = PLOT_LIMITS,
): Promise<{ readonly files: readonly string[] }> {
  const facts = reader.facts();
  const rows = inCatalogueOrder(reader.rows());
  const named = { night: facts.name, recipe_hash: facts.recipeHash ?? '', run_id: facts.runId ?? '' };
  await mkdir(directory, { recursive: true });
  // One at a time, made just before it is written: only one format of a big night is in memory at once.
  const outputs: readonly (readonly [string, () => string | Uint8Array | Promise<string>])[] = [
    ['catalogue.csv', () => catalogueCsv(rows)],
    ['catalogue.fits', () => catalogueFits(rows, fitsCards(facts))],
    ['catalogue.parquet', () => catalogueParquet(rows, named)],
    ['catalogue.vot', () => catalogueVotable(rows, facts.name, named)],
    ['run.json', () => runRecord(facts, rows)],
    ['report.html', async () => nightPage(reader, await pageAssets(), limits)],
  ];
  const files: string[] = [];
  for (const [name, make] of outputs) {
    const path = join(directory, name);
    await writeAtomically(path, await make());
    files.push(path);
  }
  return { files };
}

function fitsCards(facts: NightFacts): readonly CardSpec[] {
  return [
    { keyword: 'ORIGIN', value: 'shiftwork', comment: 'program that wrote the file' },
    { keyword: 'NIGHT', value: asciiText(facts.name), comment: 'name of the night' },
    { keyword: 'RECIPE', value: facts.recipeHash, comment: 'SHA-256 of the recipe' },
    { keyword: 'RUNID', value: facts.runId === null ? null : asciiText(facts.runId), comment: 'run' },
  ];
}
