import { realpathSync } from 'node:fs';
import { sep } from 'node:path';
import { InputFault } from '../pipeline/errors.ts';
import type { InputRecord } from '../store/index.ts';
import { checkUnchanged, hashFile } from './input-file.ts';

/** Makes sure that a file is the one that was queued, reading it in full once per process. */
export interface InputVerifier {
  /**
   * @throws InputFault `file-missing`, `file-changed`; `file-missing` too when the path now leads outside the
   *   PATH it was queued with
   */
  verify(input: InputRecord): Promise<void>;
  /** Files hashed by this very process while planning need not be read again. */
  trust(inputs: readonly InputRecord[]): void;
}

/** A verifier that has seen nothing yet. */
export function createInputVerifier(): InputVerifier {
  const seen = new Map<string, string | null>();
  return {
    verify: async (input) => {
      const label = input.relativePath;
      checkUnchanged(input.path, label, input);
      const real = realpathSync(input.path);
      if (!real.startsWith(input.root.endsWith(sep) ? input.root : input.root + sep)) {
        const detail = `path must stay under the PATH given, got ${real}`;
        throw new InputFault('file-missing', { file: label }, detail);
      }
      if (seen.get(input.id) === input.sha256) return;
      const { sha256 } = await hashFile(input.path, label);
      if (sha256 !== input.sha256) {
        throw new InputFault(
          'file-changed',
          { file: label },
          `sha256 must be ${input.sha256}, got ${sha256}`,
        );
      }
      seen.set(input.id, sha256);
    },
    trust: (inputs) => {
      for (const { id, sha256 } of inputs) seen.set(id, sha256);
    },
  };
}
