import { setTimeout as sleep } from 'node:timers/promises';
import type { MeasuringOptions } from '../config/measuring.ts';
import type { InputProfile } from '../config/profile.ts';
import { type EnvironmentFault, type Json, openSqliteStore } from '../store/index.ts';
import { jobHandler } from './handle-job.ts';
import { createInputVerifier } from './input-verifier.ts';
import { openLog } from './log.ts';
import { openMeasurePool, type PoolOptions } from './measure-pool.ts';
import { recipeHashOf, settingsOf } from './night-settings.ts';
import { ownQueue } from './owner-lock.ts';
import { planNight } from './plan-night.ts';
import { openRedisQueue } from './queue.ts';
import { newRunId, openOwnQueue, recordPlan } from './run-night.ts';
import { queueWhatIsMissing } from './tend-night.ts';
import { makeWorkspace } from './workspace.ts';

/** How often a worker looks whether nights in the store want something the queue does not hold. */
const LOOK_MS = 1_000;
/** Workers that look in the same minute queue the same jobs under the same name, and one copy is kept. */
const GENERATION_MS = 60_000;

/**
 * Plans a night into the store and, where a shared queue is configured, puts its jobs there.
 *
 * @returns the night's name and how many of its spectra want measuring
 * @throws PathFault, EnvironmentFault
 */
export async function enqueueNight(request: {
  readonly paths: readonly string[];
  readonly night: string | null;
  readonly profile: InputProfile | null;
  readonly measuring: MeasuringOptions;
  readonly workspace: string;
  readonly redisUrl: string | null;
  readonly chunkSize: number | null;
  readonly threads: number;
  readonly provenance: { readonly [key: string]: Json };
}): Promise<{ night: string; missing: number }> {
  const workspace = makeWorkspace(request.workspace);
  const store = await openSqliteStore(workspace.store);
  try {
    const plan = await planNight({ ...request, skip: [workspace.directory] });
    const settings = { measuring: request.measuring, profile: request.profile as Json };
    await recordPlan(store, plan, settings as unknown as Json);
    const recipeHash = recipeHashOf(settings);
    const { night } = plan;
    const missing = (await store.pending(night, recipeHash)).length;
    if (missing === 0) return { night, missing };
    const runId = newRunId();
    await store.startRun({
      ...{ runId, night, recipeHash, startedAt: new Date().toISOString(), finishedAt: null },
      ...{ stageMs: {}, spectraMeasured: 0, provenance: request.provenance },
    });
    if (request.redisUrl !== null) {
      const queue = await openRedisQueue(request.redisUrl);
      try {
        const pool = { threads: request.threads };
        const context = { store, queue, pool, chunkSize: request.chunkSize };
        await queueWhatIsMissing(context, { night, recipeHash, runId }, runId);
      } finally {
        await queue.close();
      }
    }
    return { night, missing };
  } finally {
    await store.close();
  }
}

/**
 * Takes jobs until stopped: off the shared queue where one is configured, else as owner of the embedded one.
 * Also looks after the nights: what the store misses and no queue holds is queued again.
 *
 * @returns how many spectra this worker measured
 * @throws WorkspaceBusy, EnvironmentFault
 */
export async function workUntilStopped(request: {
  readonly workspace: string;
  readonly redisUrl: string | null;
  readonly chunkSize: number | null;
  readonly pool: PoolOptions;
  readonly untilEmpty: boolean;
  readonly signal: AbortSignal;
  /**
   * Told once for each night with work left that this worker must not touch: it was queued under another
   * recipe (version, family files), so only planning it anew can say what is wanted.
   */
  readonly onForeignRecipe: (night: string, missing: number) => void;
}): Promise<number> {
  const workspace = makeWorkspace(request.workspace);
  const release = request.redisUrl === null ? ownQueue(workspace.queue) : () => undefined;
  const log = openLog(workspace.logs);
  const store = await openSqliteStore(workspace.store);
  const queue =
    request.redisUrl === null
      ? await openOwnQueue(workspace.queue, log)
      : await openRedisQueue(request.redisUrl);
  const pool = openMeasurePool(request.pool);
  const stop = new AbortController();
  const machineFaults: EnvironmentFault[] = [];
  let rows = 0;
  const foreign = new Set<string>();
  const onForeignRecipe = (night: string, missing: number) => {
    if (foreign.has(night)) return;
    foreign.add(night);
    log.warn({ night, missing }, 'the night was queued under another recipe and is left alone');
    request.onForeignRecipe(night, missing);
  };
  const context = {
    ...{ store, queue, pool, log, verifier: createInputVerifier(), chunkSize: request.chunkSize },
    onRows: (more: number) => {
      rows += more;
    },
  };
  const handler = jobHandler(context, (fault) => {
    machineFaults.push(fault);
    stop.abort();
  });
  const worker = queue.work(handler, pool.threads, (error) => {
    log.warn({ err: error }, 'the queue reports');
  });
  const signal = AbortSignal.any([request.signal, stop.signal]);
  try {
    while (!signal.aborted) {
      const counts = await queue.counts();
      if (counts.waiting + counts.running === 0) {
        const busy = await lookAfterNights(context, onForeignRecipe);
        if (!busy && request.untilEmpty) break;
      }
      await sleep(LOOK_MS, undefined, { signal }).catch(() => undefined);
    }
  } finally {
    await worker.stop();
    await pool.close();
    await queue.close();
    await store.close();
    release();
  }
  if (machineFaults.length > 0) throw machineFaults[0]!;
  return rows;
}

/** Queues what unfinished nights miss. Returns whether there was any. */
async function lookAfterNights(
  context: Parameters<typeof queueWhatIsMissing>[0],
  onForeignRecipe: (night: string, missing: number) => void,
): Promise<boolean> {
  const { store } = context;
  let busy = false;
  for (const night of await store.nights()) {
    const run = (await store.runs(night.name)).find(({ runId }) => runId === night.currentRun);
    if (run === undefined) continue;
    const recipeHash = recipeHashOf(settingsOf(night));
    if (recipeHash !== run.recipeHash) {
      const left = (await store.pending(night.name, run.recipeHash)).length;
      if (left > 0 || run.finishedAt === null) onForeignRecipe(night.name, left);
      continue;
    }
    const missing = (await store.pending(night.name, recipeHash)).length;
    if (missing === 0 && run.finishedAt !== null) continue;
    busy = true;
    const generation = `${run.runId}-look${Math.floor(Date.now() / GENERATION_MS)}`;
    await queueWhatIsMissing(context, { night: night.name, recipeHash, runId: run.runId }, generation);
  }
  return busy;
}
