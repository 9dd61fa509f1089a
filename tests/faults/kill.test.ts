import { spawn } from 'node:child_process';
import { resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { expect, it } from 'vitest';
import { seededRandom } from '../../pipeline/core/random.ts';
import { freshWorkspace } from '../worker/fresh-workspace.ts';
import { practiceFolder } from '../worker/practice-folder.ts';
import { practiceRun, rowsOf } from '../worker/practice-run.ts';

const PROGRAM = resolve(import.meta.dirname, 'run-practice-night.ts');
const KILLS = 4;
/** From before the plan is stored to the last chunks, on a quiet machine. */
const LATEST_KILL_MS = 6_000;

/** Starts the run in a process of its own; kills it after `killAfterMs` unless it ends before. */
function startRun(folder: string, workspace: string, killAfterMs: number | null): Promise<number | null> {
  const run = spawn(process.execPath, ['--import', 'tsx', PROGRAM, folder, workspace], { stdio: 'ignore' });
  const ended = new Promise<number | null>((done) => run.on('exit', done));
  if (killAfterMs === null) return ended;
  return Promise.race([ended, sleep(killAfterMs).then(() => run.kill('SIGKILL'))]).then(() => ended);
}

it('a run killed at any moment and started again ends with the rows of an undisturbed one', {
  timeout: 300_000,
}, async () => {
  const folder = practiceFolder();
  const undisturbed = await freshWorkspace();
  await practiceRun(folder, undisturbed, { chunkSize: 3 });
  const killed = await freshWorkspace();
  const random = seededRandom(20310403);
  for (let kill = 0; kill < KILLS; kill++) await startRun(folder, killed, random.uniform() * LATEST_KILL_MS);
  expect(await startRun(folder, killed, null)).toBe(0);
  expect(await rowsOf(killed)).toEqual(await rowsOf(undisturbed));
});
