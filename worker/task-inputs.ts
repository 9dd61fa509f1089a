import { InputFault } from '../pipeline/errors.ts';
import type { InputRecord, Outcome } from '../store/index.ts';
import type { TaskInput } from './measure-contract.ts';
import type { WorkerContext } from './worker-context.ts';

/**
 * Looks up and verifies the files of some spectra.
 *
 * @returns what a thread can read, and an outcome for each spectrum of a file that cannot be
 */
export async function taskInputs(
  context: Pick<WorkerContext, 'store' | 'verifier'>,
  spectra: readonly { inputId: string; ordinal: number; spectrumId: string }[],
): Promise<{ inputs: TaskInput[]; faults: Outcome[] }> {
  const byInput = new Map<string, { ordinal: number; spectrumId: string }[]>();
  for (const { inputId, ordinal, spectrumId } of spectra) {
    const group = byInput.get(inputId) ?? [];
    group.push({ ordinal, spectrumId });
    byInput.set(inputId, group);
  }
  const inputs: TaskInput[] = [];
  const faults: Outcome[] = [];
  for (const [inputId, group] of byInput) {
    const record = await context.store.input(inputId);
    // Planned anew without this file since the job was queued: nothing is expected of it any more.
    if (record === null) continue;
    group.sort((a, b) => a.ordinal - b.ordinal);
    const found = await openable(context, record);
    if ('code' in found) {
      const result = { fault: { word: 'unreadable', code: found.code, detail: found.detail } as const };
      for (const { spectrumId } of group) {
        faults.push({ spectrumId, inputSha256: record.sha256, facts: null, result });
      }
    } else {
      inputs.push({ ...found, spectra: group });
    }
  }
  return { inputs, faults };
}

async function openable(
  { verifier }: Pick<WorkerContext, 'verifier'>,
  record: InputRecord,
): Promise<Omit<TaskInput, 'spectra'> | NonNullable<InputRecord['fault']>> {
  if (record.fault !== null) return record.fault;
  const { layout, sha256 } = record;
  if (layout === null || sha256 === null)
    throw new TypeError(`input ${record.id} must have a layout and a hash`);
  try {
    await verifier.verify(record);
  } catch (error) {
    if (error instanceof InputFault) return { code: error.code, detail: error.message };
    throw error;
  }
  const { sizeBytes, modifiedMs, inode } = record;
  return {
    path: record.path,
    label: record.relativePath,
    state: { sizeBytes, modifiedMs, inode },
    sha256,
    layout,
  };
}
