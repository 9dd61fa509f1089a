import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import type { FamilyFileName } from '../../templates/manifest.ts';

/** Bytes of a committed file of templates/families. */
export function installedBytes(name: FamilyFileName | 'manifest.json'): Uint8Array {
  return new Uint8Array(readFileSync(resolve(import.meta.dirname, '../../templates/families', name)));
}
