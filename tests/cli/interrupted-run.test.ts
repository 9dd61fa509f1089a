import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { beforeAll, expect, it } from 'vitest';
import { queueOwner } from '../../worker/owner-lock.ts';
import type { WorkspaceStatus } from '../../worker/workspace-status.ts';
import { workspaceAt } from '../../worker/workspace.ts';
import { freshWorkspace } from '../worker/fresh-workspace.ts';
import { freshFolder } from '../worker/practice-folder.ts';

const MAIN = ['--import', 'tsx', resolve(import.meta.dirname, '../../cli/main.ts')];

let folder: string;
let workspace: string;
/** Two spectra of a flat continuum and a file that nobody can read. */
beforeAll(async () => {
  folder = join(freshFolder('night'), 'short');
  mkdirSync(folder);
  for (const name of ['one', 'two']) {
    const text = Array.from({ length: 800 }, (_, i) => `${5_000 + 2 * i} ${200 + (i % 3)} 1.0`);
    writeFileSync(join(folder, `${name}.txt`), `# wavelength flux error\n${text.join('\n')}\n`);
  }
  writeFileSync(join(folder, 'empty.fits'), '');
  workspace = await freshWorkspace();
});

function shiftwork(...args: string[]) {
  return spawnSync(process.execPath, [...MAIN, ...args, '--workspace', workspace], { encoding: 'utf8' });
}

function nightStatus() {
  const { stdout } = shiftwork('status', 'short', '--json');
  return (JSON.parse(stdout) as WorkspaceStatus).nights[0];
}

it('a run that gets SIGINT ends with 130, says how to go on and gives the workspace back', {
  timeout: 180_000,
}, async () => {
  const args = ['run', folder, '--workspace', workspace, '--threads', '1', '--chunk', '1'];
  const run = spawn(process.execPath, [...MAIN, ...args], { stdio: ['ignore', 'pipe', 'pipe'] });
  let said = '';
  run.stdout.on('data', (bytes: Buffer) => {
    said += bytes.toString();
  });
  const ended = new Promise<number | null>((done) => run.on('close', done));
  let told = '';
  await new Promise<void>((planned) => {
    run.stderr.on('data', (bytes: Buffer) => {
      told += bytes.toString();
      if (told.includes('3 to measure')) planned();
    });
    run.on('close', () => {
      planned();
    });
  });
  expect(queueOwner(workspaceAt(workspace).queue)?.pid).toBe(run.pid);
  run.kill('SIGINT');
  expect(await ended).toBe(130);
  expect(said).toContain('interrupted: the same command goes on from here');
  expect(told).toContain('stopping after the chunks in hand');
  expect(queueOwner(workspaceAt(workspace).queue)).toBeNull();
});

it('the next run completes the night', { timeout: 180_000 }, () => {
  const { status, stdout } = shiftwork('run', folder, '--threads', '1');
  expect(status).toBe(0);
  expect(stdout).toContain('rows 3 of 3');
  expect(nightStatus()).toMatchObject({ name: 'short', expected: 3, done: 3, waiting: 0, faults: 1 });
});

it('requeue --failed puts back what could not be read, and status --json shows it waiting', () => {
  const { status, stdout } = shiftwork('requeue', 'short', '--failed');
  expect(status).toBe(0);
  expect(stdout).toBe('night short: 1 spectra wait for the next worker or run\n');
  expect(nightStatus()).toMatchObject({ waiting: 1 });
});

it('requeue ends with 2 when it is not told what, or of a night that is not there', () => {
  expect(shiftwork('requeue', 'short').status).toBe(2);
  expect(shiftwork('requeue', 'long', '--failed').status).toBe(2);
});
