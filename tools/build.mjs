/**
 * `npm run build`: compiles the sources and copies what they read at run time into dist/.
 * The new build is made beside the old one and takes its place only when it is whole.
 */
import { spawnSync } from 'node:child_process';
import { chmodSync, copyFileSync, existsSync, mkdirSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, extname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { filesUnder, SOURCE_FOLDERS, sourceHash } from './source-hash.mjs';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const NEXT = join(ROOT, 'dist-next');
const DIST = join(ROOT, 'dist');

/** What the compiler consumes, and what is for readers only; everything else is read at run time. */
const NOT_COPIED = new Set(['.ts', '.md']);

/** Everybody may read, the owner may write. */
const READABLE = 0o644;

function compile(...options) {
  const tsc = join(ROOT, 'node_modules/typescript/bin/tsc');
  const run = spawnSync(process.execPath, [tsc, ...options], { cwd: ROOT, stdio: 'inherit' });
  if (run.status !== 0) {
    rmSync(NEXT, { recursive: true, force: true });
    console.error('build: the compiler found faults; dist/ is left as it was');
    process.exit(1);
  }
}

const started = performance.now();
const hash = sourceHash(ROOT);
rmSync(NEXT, { recursive: true, force: true });
compile('-p', join(ROOT, 'tsconfig.build.json'), '--outDir', NEXT);
// The browser's own sources compile with the DOM's types, and go into the report as one script.
compile('-p', join(ROOT, 'report/client/tsconfig.json'), '--noEmit');
const { buildPageScript } = await import('../report/build-page-script.mjs');
await buildPageScript(join(NEXT, 'report/client'));

let copied = 0;
for (const name of SOURCE_FOLDERS.flatMap((folder) => filesUnder(ROOT, folder))) {
  if (NOT_COPIED.has(extname(name)) || name === 'report/client/tsconfig.json') continue;
  mkdirSync(dirname(join(NEXT, name)), { recursive: true });
  copyFileSync(join(ROOT, name), join(NEXT, name));
  copied++;
}

await prepareQueue();
const command = join(NEXT, 'cli/main.js');
if (existsSync(command)) chmodSync(command, 0o755);
writeFileSync(join(NEXT, '.built'), `${hash}\n`);
rmSync(DIST, { recursive: true, force: true });
renameSync(NEXT, DIST);
console.log(`build: dist/ is new, ${copied} data files copied, ${seconds(started)} s`);

/** Leaves an empty queue beside the code that copies it into new workspaces: making one costs seconds. */
async function prepareQueue() {
  const { openEmbeddedQueue } = await import(join(NEXT, 'worker/queue.js'));
  const { PREPARED_QUEUE } = await import(join(NEXT, 'worker/prepared-queue.js'));
  const folder = join(NEXT, 'worker', PREPARED_QUEUE);
  await (await openEmbeddedQueue(folder)).close();
  // The database keeps some files to its owner; whoever runs the program must be able to copy them.
  for (const name of filesUnder(folder, '.')) chmodSync(join(folder, name), READABLE);
}

function seconds(since) {
  return ((performance.now() - since) / 1000).toFixed(1);
}
