import { linkSync, readFileSync, rmSync, writeFileSync } from 'node:fs';

/** How often a waiting set-up looks whether the other one has finished, ms. */
const POLL_MS = 250;

/**
 * Takes a lock that one process at a time can hold, waiting for a living holder to finish.
 * A lock whose holder is dead is taken over.
 *
 * @param {string} path the lock file; it holds its owner's process id
 * @param {(owner: number) => void} onWait called once when a living process holds the lock
 * @returns {() => void} gives the lock back
 */
export function takeLock(path, onWait) {
  // Linking a finished file makes the lock appear with its owner's id already in it.
  const mine = `${path}.${process.pid}`;
  writeFileSync(mine, String(process.pid));
  try {
    for (let waiting = false; !linked(mine, path); ) {
      const owner = ownerOf(path);
      if (owner === null) continue;
      if (!isAlive(owner)) {
        rmSync(path, { force: true });
        continue;
      }
      if (!waiting) onWait(owner);
      waiting = true;
      Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, POLL_MS);
    }
  } finally {
    rmSync(mine, { force: true });
  }
  return () => {
    rmSync(path, { force: true });
  };
}

function linked(from, to) {
  try {
    linkSync(from, to);
    return true;
  } catch (error) {
    if (error.code === 'EEXIST') return false;
    throw error;
  }
}

/** Null when the owner gave the lock back in the meantime. */
function ownerOf(path) {
  try {
    return Number.parseInt(readFileSync(path, 'utf8'), 10);
  } catch (error) {
    if (error.code === 'ENOENT') return null;
    throw error;
  }
}

function isAlive(id) {
  try {
    process.kill(id, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}
