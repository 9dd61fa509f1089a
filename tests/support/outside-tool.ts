import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';

/** Debian's Python: another `python3` earlier on PATH may lack astropy. */
export const PYTHON = '/usr/bin/python3';

/**
 * Whether an outside program that a test compares with can be used. Where CI is set it must be there.
 *
 * @param path full path of the program
 * @param args a call that succeeds exactly when the program is usable
 * @param packageName the Debian package that brings it
 * @throws Error when it is absent and CI is set
 */
export function hasOutsideTool(path: string, args: readonly string[], packageName: string): boolean {
  const reason = `${path} is not usable; install the Debian package ${packageName}`;
  try {
    if (existsSync(path)) {
      execFileSync(path, args, { stdio: 'ignore' });
      return true;
    }
  } catch {
    // Falls through to the same answer as an absent program.
  }
  if ((process.env['CI'] ?? '') !== '') throw new Error(reason);
  console.warn(`skipped: ${reason}`);
  return false;
}

/** Standard output of a program, as text. */
export function outputOf(path: string, args: readonly string[]): string {
  return execFileSync(path, args, { encoding: 'utf8', maxBuffer: 1 << 26 });
}
