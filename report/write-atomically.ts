import { open, rename, rm } from 'node:fs/promises';

/**
 * Writes a file so that a reader sees the old one or the new one, never a part: beside it, synced, then renamed.
 * A failed write (full disk) leaves the old file as it was and no scraps.
 */
export async function writeAtomically(path: string, content: string | Uint8Array): Promise<void> {
  const beside = `${path}.${process.pid}.part`;
  try {
    const file = await open(beside, 'w');
    try {
      await file.writeFile(content);
      await file.sync();
    } finally {
      await file.close();
    }
    await rename(beside, path);
  } catch (fault) {
    await rm(beside, { force: true });
    throw fault;
  }
}
