import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { layOutQueue, PREPARED_QUEUE } from '../../worker/prepared-queue.ts';
import { openEmbeddedQueue } from '../../worker/queue.ts';
import { makeWorkspace } from '../../worker/workspace.ts';
import { freshFolder } from './practice-folder.ts';

/** What the build prepared, which `npm test` runs first. */
const BUILT = resolve(import.meta.dirname, '../../dist/worker', PREPARED_QUEUE);

/** An empty queue, found or made once per test file: making one takes seconds, copying it does not. */
let emptyQueue: Promise<string> | null = null;

async function makeEmptyQueue(): Promise<string> {
  if (existsSync(BUILT)) return BUILT;
  const folder = join(freshFolder('queue'), 'jobs');
  await (await openEmbeddedQueue(folder)).close();
  return folder;
}

/** A new workspace of this test's own whose queue opens at once. */
export async function freshWorkspace(): Promise<string> {
  emptyQueue ??= makeEmptyQueue();
  const { directory, queue } = makeWorkspace(freshFolder('workspace'));
  layOutQueue(join(queue, 'jobs'), await emptyQueue);
  return directory;
}
