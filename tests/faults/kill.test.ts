import { DatabaseSync } from '@photostructure/sqlite';
import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { expect, it } from 'vitest';
import { seededRandom } from '../../pipeline/core/random.ts';
import { workspaceAt } from '../../worker/workspace.ts';
import { freshWorkspace } from '../worker/fresh-workspace.ts';
import { practiceFolder } from '../worker/practice-folder.ts';
import { practiceRun, rowsOf } from '../worker/practice-run.ts';

const PROGRAM = resolve(import.meta.dirname, 'run-practice-night.ts');
const SEED = Number(process.env['SHIFTWORK_TEST_SEED'] ?? 20_310_403);
/** Each kill comes somewhere in one of these spans of rows, so that every run of three gets further. */
const KILLED_WITHIN = [
  [1, 6],
  [7, 12],
  [13, 18],
] as const;
const POLL_MS = 2;

/** A run in a process of its own, with one thread and a chunk per spectrum: rows appear one by one. */
function startRun(folder: string, workspace: string) {
  const run = spawn(process.execPath, ['--import', 'tsx', PROGRAM, folder, workspace], { stdio: 'ignore' });
  const ended = new Promise<number | NodeJS.Signals | null>((done) =>
    run.on('exit', (code, signal) => {
      done(signal ?? code);
    }),
  );
  return { run, ended };
}

/** Kills the run as soon as `rows` rows are in its store. Returns how the process ended. */
async function runKilledAt(folder: string, workspace: string, rows: number) {
  const { run, ended } = startRun(folder, workspace);
  while (run.exitCode === null && rowsInStore(workspace) < rows) await sleep(POLL_MS);
  run.kill('SIGKILL');
  return ended;
}

/** Looks past the program, straight into the file; 0 while the file or its tables are not there. */
function rowsInStore(workspace: string): number {
  const path = workspaceAt(workspace).store;
  if (!existsSync(path)) return 0;
  try {
    const file = new DatabaseSync(path, { readOnly: true, timeout: 1_000 });
    try {
      const counted = file.prepare('select count(*) as written from measurements').get() as {
        written: number;
      };
      return counted.written;
    } finally {
      file.close();
    }
  } catch {
    return 0;
  }
}

it('a run killed at any row and started again ends with the catalogue of an undisturbed one', {
  timeout: 300_000,
}, async () => {
  const random = seededRandom(SEED);
  const kills = KILLED_WITHIN.map(
    ([from, to]) => from + Math.min(to - from, Math.floor(random.uniform() * (to - from + 1))),
  );
  console.log(`seed ${SEED} (SHIFTWORK_TEST_SEED): killed once there are ${kills.join(', ')} rows`);
  const folder = practiceFolder();
  const undisturbed = await freshWorkspace();
  await practiceRun(folder, undisturbed);
  const killed = await freshWorkspace();
  for (const rows of kills) {
    expect(await runKilledAt(folder, killed, rows)).toBe('SIGKILL');
    expect(rowsInStore(killed)).toBeGreaterThanOrEqual(rows);
    expect(rowsInStore(killed)).toBeLessThan(25);
  }
  expect(await startRun(folder, killed).ended).toBe(0);
  expect(await rowsOf(killed)).toEqual(await rowsOf(undisturbed));
});
