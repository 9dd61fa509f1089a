import { cpSync, existsSync, renameSync, rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { asEnvironmentFault } from '../store/index.ts';

/** Name of the empty queue that the build leaves beside the compiled form of this file. */
export const PREPARED_QUEUE = 'empty-queue';

/**
 * Gives a new workspace a copy of the empty queue that the build made: making one takes six seconds of a
 * processor, copying it a quarter of one. Does nothing where a queue is already, or where the program runs
 * from its sources and nothing was prepared; then opening the queue makes it.
 *
 * The caller must own the queue (see ownQueue).
 *
 * @param directory of the embedded queue's database; its parent must exist
 * @param prepared folder of the empty queue
 * @throws EnvironmentFault when the copy cannot be written
 */
export function layOutQueue(directory: string, prepared: string = besideThisFile()): void {
  if (existsSync(directory) || !existsSync(prepared)) return;
  // Whole or absent: a process killed while copying must not leave a queue with parts missing.
  const draft = `${directory}.draft`;
  try {
    rmSync(draft, { recursive: true, force: true });
    cpSync(prepared, draft, { recursive: true });
    renameSync(draft, directory);
  } catch (error) {
    throw asEnvironmentFault(error);
  }
}

function besideThisFile(): string {
  return fileURLToPath(new URL(PREPARED_QUEUE, import.meta.url));
}
