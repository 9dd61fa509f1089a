import { spawnSync } from 'node:child_process';
import { resolve } from 'node:path';
import { expect, it } from 'vitest';
import { ownQueue } from '../../worker/owner-lock.ts';
import { makeWorkspace } from '../../worker/workspace.ts';
import { freshFolder, practiceFolder } from '../worker/practice-folder.ts';

const MAIN = resolve(import.meta.dirname, '../../cli/main.ts');

function shiftwork(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', 'tsx', MAIN, ...args], {
    encoding: 'utf8',
  });
  return { status, stdout, stderr };
}

it('shiftwork --help names every verb and the exit statuses, and loads no database', () => {
  const { status, stdout } = shiftwork('--help');
  expect(status).toBe(0);
  for (const verb of ['run', 'enqueue', 'work', 'status', 'report', 'requeue', 'inspect', 'config']) {
    expect(stdout).toMatch(new RegExp(`^ {2}${verb} `, 'm'));
  }
  expect(stdout).toContain('Exit status');
});

it('shiftwork ends with 2 on a PATH that does not exist, an unknown option and a value out of range', () => {
  const workspace = freshFolder('workspace');
  expect(shiftwork('run', '/no/such/folder', '--workspace', workspace).status).toBe(2);
  expect(shiftwork('config', '--set', 'nonsense=1').status).toBe(2);
  expect(shiftwork('config', '--set', 'threads=0').status).toBe(2);
});

it('shiftwork run ends with 3 while another process owns the workspace, and names it', () => {
  const workspace = freshFolder('workspace');
  const release = ownQueue(makeWorkspace(workspace).queue);
  const { status, stderr } = shiftwork('run', practiceFolder(), '--workspace', workspace);
  release();
  expect(status).toBe(3);
  expect(stderr).toContain(`process ${process.pid}`);
});

it('shiftwork run --dry-run lists what would be measured and makes no workspace', () => {
  const workspace = `${freshFolder('workspace')}/not-there`;
  const { status, stdout } = shiftwork('run', practiceFolder(), '--dry-run', '--workspace', workspace);
  expect(status).toBe(0);
  expect(stdout).toContain('night 2031-04-02: 25 spectra in 3 files');
  expect(shiftwork('status', '--json', '--workspace', workspace).stdout).toContain('"nights": []');
});
