import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { layOutQueue } from '../../worker/prepared-queue.ts';
import { freshFolder } from './practice-folder.ts';

/** Stands for an empty queue: what is in it does not matter to the copying. */
function preparedFolder(): string {
  const prepared = freshFolder('prepared');
  mkdirSync(join(prepared, 'base'));
  writeFileSync(join(prepared, 'base', 'table'), 'empty');
  return prepared;
}

it('layOutQueue() gives a new workspace the prepared queue and leaves nothing else beside it', () => {
  const parent = freshFolder('queue');
  layOutQueue(join(parent, 'jobs'), preparedFolder());
  expect(readFileSync(join(parent, 'jobs/base/table'), 'utf8')).toBe('empty');
  expect(readdirSync(parent)).toEqual(['jobs']);
});

it('layOutQueue() starts over after a process that was killed while copying', () => {
  const parent = freshFolder('queue');
  mkdirSync(join(parent, 'jobs.draft'));
  writeFileSync(join(parent, 'jobs.draft', 'half'), '');
  layOutQueue(join(parent, 'jobs'), preparedFolder());
  expect(readdirSync(join(parent, 'jobs'))).toEqual(['base']);
  expect(readdirSync(parent)).toEqual(['jobs']);
});

it('layOutQueue() leaves a queue that is there as it is', () => {
  const parent = freshFolder('queue');
  mkdirSync(join(parent, 'jobs'));
  writeFileSync(join(parent, 'jobs', 'mine'), '');
  layOutQueue(join(parent, 'jobs'), preparedFolder());
  expect(readdirSync(join(parent, 'jobs'))).toEqual(['mine']);
});

it('layOutQueue() leaves it to the opening where nothing was prepared, as when run from the sources', () => {
  const parent = freshFolder('queue');
  layOutQueue(join(parent, 'jobs'));
  expect(existsSync(join(parent, 'jobs'))).toBe(false);
});
