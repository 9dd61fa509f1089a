import type { NightPayload } from './job-payloads.ts';
import { findClashes } from './repeat-clash.ts';
import { findFibrePatterns } from './fibre-pattern.ts';
import type { WorkerContext } from './worker-context.ts';

/**
 * After all chunks: compares the night's rows with each other, in spectrum-id order and from the store alone,
 * and closes the run. Does nothing while a spectrum still lacks its row.
 */
export async function runNightJob({ store, log }: WorkerContext, payload: NightPayload): Promise<void> {
  const { night, recipeHash, runId } = payload;
  if ((await store.pending(night, recipeHash)).length > 0) return;
  const rows = await store.rows(night);
  const { reasons: clashes, targets } = findClashes(rows);
  const reasons = [...clashes, ...findFibrePatterns(rows)];
  await store.saveNightFindings(night, recipeHash, reasons, targets);
  await store.finishRun(runId, new Date().toISOString());
  log.info({ night, runId, rows: rows.length, reasons: reasons.length }, 'the night is finished');
}
