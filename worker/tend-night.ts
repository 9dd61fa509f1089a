import { setTimeout as sleep } from 'node:timers/promises';
import { planChunks } from './chunk-plan.ts';
import type { JobOrder } from './job-payloads.ts';
import { chunkSizeFor, type SpeedContext } from './speed.ts';
import type { WorkerContext } from './worker-context.ts';

/** How often the queue is asked whether it has run dry; a chunk takes seconds. */
const POLL_MS = 200;

/** Passes over a night that may follow each other without a single new row before it is given up. */
const FRUITLESS_PASSES = 3;

/** One run over one night. */
export interface NightRun {
  readonly night: string;
  readonly recipeHash: string;
  readonly runId: string;
}

/**
 * Puts on the queue whatever the night still needs: exposures (which queue their chunks), chunks of spectra
 * that belong to no exposure, or, when every spectrum has its row, the night job.
 *
 * The store decides, never the queue: this is also how work that the queue lost comes back.
 *
 * @param generation orders of equal content and generation are queued once
 * @returns how many spectra lack a row
 */
export async function queueWhatIsMissing(
  context: SpeedContext & Pick<WorkerContext, 'queue'>,
  run: NightRun,
  generation: string,
): Promise<number> {
  const { night, recipeHash, runId } = run;
  const base = { night, recipeHash, runId };
  const pending = await context.store.pending(night, recipeHash);
  if (pending.length === 0) {
    await context.queue.add([{ kind: 'night', payload: base }], generation);
    return 0;
  }
  const exposures = new Set(pending.map(({ exposureKey }) => exposureKey));
  const single = pending.filter(({ exposureKey }) => exposureKey === null);
  const size = await chunkSizeFor(context, night, single.length);
  const orders: JobOrder[] = [...exposures]
    .filter((exposureKey) => exposureKey !== null)
    .map((exposureKey) => ({ kind: 'exposure', payload: { ...base, exposureKey } }));
  for (const chunk of planChunks(single, size)) {
    orders.push({ kind: 'chunk', payload: { ...base, ...chunk } });
  }
  await context.queue.add(orders, generation);
  return pending.length;
}

/**
 * Sees a night through to its end: queues what is missing, waits until the queue is dry, and looks again,
 * until the night job has closed the run.
 *
 * @param signal stops the waiting; what is done is kept
 * @returns how many spectra still lack a row: 0 unless it was stopped or the same work kept failing
 */
export async function tendNight(
  context: SpeedContext & Pick<WorkerContext, 'queue' | 'log'>,
  run: NightRun,
  signal: AbortSignal,
): Promise<number> {
  let least = Number.POSITIVE_INFINITY;
  let fruitless = 0;
  for (let pass = 1; ; pass++) {
    const missing = await queueWhatIsMissing(context, run, `${run.runId}-pass${pass}`);
    fruitless = missing < least ? 0 : fruitless + 1;
    least = Math.min(least, missing);
    if (fruitless >= FRUITLESS_PASSES) {
      context.log.error({ ...run, missing }, 'the same spectra failed again and again; see the lines above');
      return missing;
    }
    while (!signal.aborted) {
      await sleep(POLL_MS);
      const counts = await context.queue.counts();
      if (counts.waiting + counts.running === 0) break;
    }
    if (signal.aborted) return (await context.store.pending(run.night, run.recipeHash)).length;
    if (missing === 0) return 0;
    if (pass > 1) context.log.info({ ...run, pass, missing }, 'looked for spectra without a row');
  }
}
