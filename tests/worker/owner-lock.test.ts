import { spawnSync } from 'node:child_process';
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { ownQueue, queueOwner, WorkspaceBusy } from '../../worker/owner-lock.ts';
import { freshFolder } from './practice-folder.ts';

it('ownQueue() refuses a second owner and names the first, its process and its start', () => {
  const folder = freshFolder('lock');
  const started = new Date('2031-04-02T21:00:00Z');
  const release = ownQueue(folder, started);
  expect(() => ownQueue(folder)).toThrow(WorkspaceBusy);
  expect(() => ownQueue(folder)).toThrow(`process ${process.pid}, started 2031-04-02T21:00:00.000Z`);
  expect(queueOwner(folder)).toEqual({ pid: process.pid, startedAt: '2031-04-02T21:00:00.000Z' });
  release();
  expect(queueOwner(folder)).toBeNull();
});

it('ownQueue() takes over from an owner that was killed', () => {
  const folder = freshFolder('lock');
  const ended = spawnSync(process.execPath, ['-e', '']).pid;
  const note = { pid: ended, startedAt: '2031-04-02T21:00:00Z', processStart: '1' };
  writeFileSync(join(folder, 'owner'), JSON.stringify(note));
  const release = ownQueue(folder);
  expect(queueOwner(folder)!.pid).toBe(process.pid);
  release();
});

it.skipIf(!existsSync('/proc/self/stat'))(
  'ownQueue() is not fooled when the number of a killed owner belongs to another process now',
  () => {
    const folder = freshFolder('lock');
    const note = { pid: process.pid, startedAt: '2031-04-02T21:00:00Z', processStart: '1' };
    writeFileSync(join(folder, 'owner'), JSON.stringify(note));
    ownQueue(folder)();
    expect(existsSync(join(folder, 'owner'))).toBe(false);
  },
);

it('ownQueue() clears away a note that a full disk left empty', () => {
  const folder = freshFolder('lock');
  writeFileSync(join(folder, 'owner'), '');
  ownQueue(folder)();
  expect(existsSync(join(folder, 'owner'))).toBe(false);
});
