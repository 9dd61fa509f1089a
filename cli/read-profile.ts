import { readFileSync } from 'node:fs';
import { type InputProfile, parseProfile } from '../config/profile.ts';
import { UsageFault } from './exit-status.ts';

/**
 * Reads the profile a person named.
 *
 * @throws UsageFault when there is no such file; ProfileFault when it is not a profile
 */
export function readProfile(path: string): InputProfile {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch {
    throw new UsageFault(`--profile must name a file that can be read, got ${path}`);
  }
  return parseProfile(text, path);
}
