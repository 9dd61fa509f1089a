/**
 * Generates the star family from physics: every star of the grid in worker threads, each kept in a cache, then
 * one FITS file. Interrupted runs go on where they stopped; a change of the recipe starts a new cache.
 *
 *   npx tsx tools/build-stars.ts --lines FILE --cache DIR [--out FILE] [--threads N] [--first N]
 *
 * FILE is a list of atomic lines: air wavelength in angstrom, atomic number, ion, lower energy eV, log gf.
 */
import { createHash } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync, existsSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import { assembleLines, parseTables, TABLE_FILES } from '../templates/physics/tables.ts';
import type { TableTexts } from '../templates/physics/tables.ts';
import { STAR_GRID, starNamed } from '../templates/stars/parameters.ts';
import { synthesizeStar } from '../templates/stars/synthesize-star.ts';
import { starFamilyFile } from '../templates/stars/star-family-file.ts';
import { toStoredStar } from '../templates/stars/stored-star.ts';

const TEMPLATES = fileURLToPath(new URL('../templates/', import.meta.url));
const RECIPE_FOLDERS = ['physics', 'stars', 'data'];
/** Coprime to the size of the grid: an interrupted run leaves stars of every kind. */
const SPREAD_STRIDE = 37;

/** Node 20 does not hand the TypeScript loader on to threads: each registers it and then loads this file. */
const WORKER_ENTRY = `import('tsx/esm/api').then((tsx) => { tsx.register(); return import('${import.meta.url}'); });`;

interface Job {
  readonly linesFile: string;
  readonly cache: string;
}

/** Texts of the bundled tables. */
function readTexts(): TableTexts {
  const entries = Object.entries(TABLE_FILES).map(([key, file]) => [
    key,
    readFileSync(join(TEMPLATES, 'data', file), 'utf8'),
  ]);
  return Object.fromEntries(entries) as TableTexts;
}

/** sha256 over everything a spectrum depends on: code, tables, line list. */
function recipeHash(linesFile: string): string {
  const hash = createHash('sha256').update(readFileSync(linesFile));
  for (const folder of RECIPE_FOLDERS) {
    const files = readdirSync(join(TEMPLATES, folder)).filter((file) => /\.(ts|csv)$/.test(file));
    for (const file of files.sort()) {
      hash.update(file).update(readFileSync(join(TEMPLATES, folder, file)));
    }
  }
  return hash.digest('hex');
}

const cacheFile = (cache: string, name: string): string => join(cache, `${name.replaceAll(' ', '_')}.f32`);

/** Stars in an order that spreads over the grid. */
const spreadNames = (): string[] =>
  STAR_GRID.map((_, i) => STAR_GRID[(i * SPREAD_STRIDE) % STAR_GRID.length]!.name);

/** In a thread: computes the stars whose names arrive, writes each, answers with name and seconds. */
function serve(job: Job): void {
  const texts = readTexts();
  const tables = parseTables(texts);
  const lines = assembleLines(readFileSync(job.linesFile, 'utf8'), texts);
  parentPort?.on('message', (name: string) => {
    const start = performance.now();
    const flux = synthesizeStar(starNamed(name), tables, lines);
    const file = cacheFile(job.cache, name);
    writeFileSync(`${file}.part`, new Uint8Array(flux.buffer));
    renameSync(`${file}.part`, file);
    parentPort?.postMessage([name, (performance.now() - start) / 1000]);
  });
  parentPort?.postMessage(undefined);
}

/** Hands names to threads until none is left. */
async function compute(names: string[], threads: number, job: Job): Promise<void> {
  let done = 0;
  const total = names.length;
  const run = (): Promise<void> =>
    new Promise((resolve, reject) => {
      const worker = new Worker(WORKER_ENTRY, { workerData: job, eval: true });
      worker.on('error', reject);
      worker.on('message', (answer: [string, number] | undefined) => {
        if (answer) {
          done += 1;
          console.log(`${done}/${total} ${answer[0]} ${answer[1].toFixed(1)} s`);
        }
        const next = names.shift();
        if (next === undefined) {
          void worker.terminate().then(() => {
            resolve();
          });
        } else {
          worker.postMessage(next);
        }
      });
    });
  await Promise.all(Array.from({ length: Math.min(threads, total) }, run));
}

/** All finished stars of the grid, in its order. */
function collect(cache: string) {
  return STAR_GRID.filter(({ name }) => existsSync(cacheFile(cache, name))).map((parameters) => {
    const bytes = readFileSync(cacheFile(cache, parameters.name));
    const flux = new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
    return toStoredStar(parameters, flux);
  });
}

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      lines: { type: 'string' },
      cache: { type: 'string' },
      out: { type: 'string', default: join(TEMPLATES, 'families', 'stars.fits') },
      threads: { type: 'string', default: '1' },
      first: { type: 'string', default: String(STAR_GRID.length) },
    },
  });
  if (values.lines === undefined || values.cache === undefined) {
    throw new Error('--lines FILE and --cache DIR must be given');
  }
  const hash = recipeHash(values.lines);
  const cache = join(values.cache, hash.slice(0, 16));
  mkdirSync(cache, { recursive: true });
  const missing = spreadNames()
    .slice(0, Number(values.first))
    .filter((name) => !existsSync(cacheFile(cache, name)));
  await compute(missing, Number(values.threads), { linesFile: values.lines, cache });
  const stars = collect(cache);
  writeFileSync(values.out, starFamilyFile(stars));
  console.log(`${stars.length} stars, recipe ${hash}: ${values.out}`);
}

if (isMainThread) {
  await main();
} else {
  serve(workerData as Job);
}
