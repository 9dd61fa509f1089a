import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';

const ROOT = process.env['SHIFTWORK_SHARED'] ?? resolve(import.meta.dirname, '../../../shared');

/**
 * Path of a file or folder of the shared development data, which is not part of the project.
 *
 * @param parts path below the folder named by SHIFTWORK_SHARED, or else `shared` beside the project
 * @returns null when it is absent: the test must then skip and print `skipReason`
 */
export function sharedPath(...parts: string[]): string | null {
  const path = join(ROOT, ...parts);
  return existsSync(path) ? path : null;
}

/**
 * Prints why tests skip, once per call, and returns the sentence.
 *
 * @param what what is absent, in plain words
 */
export function printSkipReason(what: string): string {
  const reason = `skipped: ${what} is absent; set SHIFTWORK_SHARED to the folder that holds it`;
  console.warn(reason);
  return reason;
}
