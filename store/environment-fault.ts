/**
 * The machine, not the input or the program, is at fault: a full disk, a server out of reach, a file that
 * may not be written. The command line ends with status 4.
 */
export class EnvironmentFault extends Error {
  override readonly name = 'EnvironmentFault';

  /** @param detail what happened and what to do about it, one sentence */
  constructor(detail: string, cause?: unknown) {
    super(detail, cause === undefined ? undefined : { cause });
  }
}

/** SQLite primary result codes that speak of the machine (sqlite.org/rescode.html). */
const SQLITE_MACHINE_CODES: Readonly<Record<number, string>> = {
  8: 'the store may not be written: check the permissions of the workspace',
  10: 'reading or writing the store failed: check the disk under the workspace',
  11: 'the store is damaged: restore store.sqlite from a copy, or move it away and run again',
  13: 'the disk under the workspace is full: make room and run again',
  14: 'the store cannot be opened: check that the workspace exists and may be written',
  26: 'store.sqlite is not a store: move it away and run again',
};

/** Node's codes for the same troubles outside the database. */
const SYSTEM_CODES: Readonly<Record<string, string>> = {
  ENOSPC: 'the disk is full: make room and run again',
  EDQUOT: 'the disk quota is used up: make room and run again',
  EROFS: 'the workspace is on a read-only disk: choose another with --workspace',
  EACCES: 'the workspace may not be written: choose another with --workspace',
  EMFILE: 'too many files are open: raise the limit (ulimit -n) and run again',
  ECONNREFUSED: 'the server refuses connections: start it or correct its address',
  ENOTFOUND: 'the server is unknown: correct its address',
  ETIMEDOUT: 'the server does not answer: start it or correct its address',
};

/**
 * Recognises troubles of the machine among errors of the database driver and of Node.
 *
 * @returns an EnvironmentFault, or the error as it came when it is something else
 */
export function asEnvironmentFault(error: unknown): unknown {
  if (!(error instanceof Error) || error instanceof EnvironmentFault) return error;
  const { errcode, code } = error as Error & { errcode?: unknown; code?: unknown };
  // Extended result codes carry the primary code in their low byte.
  const primary = typeof errcode === 'number' ? errcode & 0xff : -1;
  const detail = SQLITE_MACHINE_CODES[primary] ?? (typeof code === 'string' ? SYSTEM_CODES[code] : undefined);
  return detail === undefined ? error : new EnvironmentFault(`${detail} (${error.message})`, error);
}
