import { NO_EXPOSURE_CONTEXT } from '../pipeline/grid/index.ts';
import { planChunks } from './chunk-plan.ts';
import type { ExposurePayload } from './job-payloads.ts';
import { ThreadLost } from './measure-contract.ts';
import { chunkSizeFor } from './speed.ts';
import { taskInputs } from './task-inputs.ts';
import type { WorkerContext } from './worker-context.ts';

/**
 * Reads one exposure for its noise, remembers it, then queues the exposure's chunks. The order is the point:
 * a chunk never runs before its exposure is known, so chunk size and order cannot move a number.
 */
export async function runExposure(context: WorkerContext, payload: ExposurePayload): Promise<void> {
  const { store, queue, log } = context;
  const { night, exposureKey, recipeHash, runId } = payload;
  const members = (await store.inputs(night)).filter((input) => input.exposureKey === exposureKey);
  const ids = new Set(members.map((input) => input.id));
  if ((await store.exposureContext(night, exposureKey, recipeHash)) === null) {
    const spectra = (await store.expected(night)).filter(({ inputId }) => ids.has(inputId));
    const { inputs } = await taskInputs(context, spectra);
    let noise = NO_EXPOSURE_CONTEXT;
    try {
      if (inputs.length > 0) noise = await context.pool.exposure({ kind: 'exposure', inputs });
    } catch (error) {
      if (!(error instanceof ThreadLost)) throw error;
      log.warn({ exposureKey, code: error.code }, `the exposure's noise stays unknown: ${error.message}`);
    }
    await store.saveExposureContext(night, exposureKey, recipeHash, noise);
  }
  const pending = (await store.pending(night, recipeHash)).filter(({ inputId }) => ids.has(inputId));
  const size = await chunkSizeFor(context, night, pending.length);
  const chunks = planChunks(pending, size);
  await queue.add(
    chunks.map((chunk) => ({ kind: 'chunk', payload: { ...chunk, night, recipeHash, runId } })),
    `${runId}-${Date.now()}`,
  );
}
