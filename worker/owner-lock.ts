import { closeSync, linkSync, openSync, readFileSync, rmSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { z } from 'zod';

/** Another process works on this workspace. The command line ends with status 3. */
export class WorkspaceBusy extends Error {
  override readonly name = 'WorkspaceBusy';

  constructor(owner: { pid: number; startedAt: string }) {
    super(
      `the workspace is in use by process ${owner.pid}, started ${owner.startedAt}: ` +
        'wait for it, stop it, or choose another with --workspace',
    );
  }
}

const ownerNote = z.object({
  pid: z.int().min(1),
  startedAt: z.string(),
  processStart: z.string().nullable(),
});
type Owner = z.infer<typeof ownerNote>;

/**
 * Makes this process the only owner of an embedded queue: two would silently lose each other's data.
 *
 * The note is made with O_EXCL and names the process and when that process began, so a note left by a killed
 * owner is recognised even when its number has been given to another process since.
 *
 * @param directory of the queue; must exist
 * @returns gives the ownership back
 * @throws WorkspaceBusy when a living process holds it
 */
export function ownQueue(directory: string, now: Date = new Date()): () => void {
  const path = join(directory, 'owner');
  const own: Owner = {
    pid: process.pid,
    startedAt: now.toISOString(),
    processStart: processStart(process.pid),
  };
  // Twice: once more after a stale note has been cleared away.
  for (let attempt = 0; attempt < 2; attempt++) {
    if (writeNote(path, own)) {
      return () => {
        if (readNote(path)?.pid === process.pid) rmSync(path, { force: true });
      };
    }
    const owner = readNote(path);
    if (owner !== null && isAlive(owner)) throw new WorkspaceBusy(owner);
    rmSync(path, { force: true });
  }
  throw new WorkspaceBusy(readNote(path) ?? own);
}

/** The living owner of a queue, or null. Takes nothing. */
export function queueOwner(directory: string): { pid: number; startedAt: string } | null {
  const owner = readNote(join(directory, 'owner'));
  return owner !== null && isAlive(owner) ? { pid: owner.pid, startedAt: owner.startedAt } : null;
}

/** The note is complete when it appears: written beside, then linked, which fails if one is there. */
function writeNote(path: string, owner: Owner): boolean {
  const draft = `${path}.${owner.pid}`;
  rmSync(draft, { force: true });
  const file = openSync(draft, 'wx');
  try {
    writeSync(file, JSON.stringify(owner));
  } finally {
    closeSync(file);
  }
  try {
    linkSync(draft, path);
    return true;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'EEXIST') return false;
    throw error;
  } finally {
    rmSync(draft, { force: true });
  }
}

function readNote(path: string): Owner | null {
  try {
    const parsed = ownerNote.safeParse(JSON.parse(readFileSync(path, 'utf8')));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}

function isAlive(owner: Owner): boolean {
  try {
    process.kill(owner.pid, 0);
  } catch (error) {
    // EPERM: it lives, under another user.
    if ((error as NodeJS.ErrnoException).code !== 'EPERM') return false;
  }
  const start = processStart(owner.pid);
  return start === null || owner.processStart === null || start === owner.processStart;
}

/** Field of /proc/PID/stat, counted after the name in brackets, that holds the start time (proc(5), 22). */
const START_TIME_FIELD = 19;

/** When a process began, in ticks since boot; null where the system does not say (not Linux). */
function processStart(pid: number): string | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    // A killed process whose parent has not noticed yet is no owner.
    if (fields[0] === 'Z') return 'ended';
    return fields[START_TIME_FIELD] ?? null;
  } catch {
    return null;
  }
}
