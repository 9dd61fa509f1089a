import { randomBytes } from 'node:crypto';
import { rmSync } from 'node:fs';
import type { MeasuringOptions } from '../config/measuring.ts';
import type { InputProfile } from '../config/profile.ts';
import {
  type EnvironmentFault,
  type InputRecord,
  type Json,
  type NightCounts,
  openSqliteStore,
  type Store,
} from '../store/index.ts';
import { jobHandler } from './handle-job.ts';
import { createInputVerifier } from './input-verifier.ts';
import { openLog, type WorkLog } from './log.ts';
import { openMeasurePool, type PoolOptions } from './measure-pool.ts';
import { recipeHashOf } from './night-settings.ts';
import { ownQueue } from './owner-lock.ts';
import { type NightPlan, planNight } from './plan-night.ts';
import { layOutQueue } from './prepared-queue.ts';
import { openEmbeddedQueue, type WorkQueue } from './queue.ts';
import { tendNight } from './tend-night.ts';
import { makeWorkspace, type Workspace } from './workspace.ts';

export interface RunRequest {
  readonly paths: readonly string[];
  readonly workspace: string;
  readonly night: string | null;
  readonly profile: InputProfile | null;
  readonly measuring: MeasuringOptions;
  readonly chunkSize: number | null;
  readonly pool: PoolOptions;
  /** Measure every spectrum again, whatever the store holds. */
  readonly again: boolean;
  /** Kept with the run: program version, options and where they came from. */
  readonly provenance: { readonly [key: string]: Json };
  readonly signal: AbortSignal;
  readonly progress: RunProgress;
}

/** What a run tells while it goes on. */
export interface RunProgress {
  planning(done: number, of: number): void;
  /** Spectra that lack a row, once the plan is made. */
  planned(plan: NightPlan, missing: number): void;
  measured(rows: number): void;
}

export interface RunSummary {
  readonly night: string;
  readonly workspace: Workspace;
  readonly runId: string;
  readonly leftOut: NightPlan['leftOut'];
  /** Spectra measured by this run. */
  readonly measured: number;
  /** Expected spectra without a row. */
  readonly missing: number;
  readonly counts: NightCounts;
  readonly stageMs: Readonly<Record<string, number>>;
  readonly interrupted: boolean;
}

/**
 * One go over one night on this machine: plan, queue, measure, compare. Started again after any end it takes
 * up what is missing; when nothing is, it measures nothing.
 *
 * @param finish called while the store is still open and the night is complete or stopped, e.g. to write what
 *   is handed out
 * @throws PathFault, WorkspaceBusy, EnvironmentFault
 */
export async function runNight(
  request: RunRequest,
  finish: (store: Store, summary: RunSummary) => Promise<void>,
): Promise<RunSummary> {
  const workspace = makeWorkspace(request.workspace);
  const release = ownQueue(workspace.queue);
  try {
    const log = openLog(workspace.logs);
    const store = await openSqliteStore(workspace.store);
    try {
      const summary = await runInStore(store, workspace, request, log);
      await finish(store, summary);
      return summary;
    } finally {
      await store.close();
    }
  } finally {
    release();
  }
}

/**
 * The same over a store that is open already and whose workspace this process owns.
 *
 * @throws PathFault, EnvironmentFault
 */
export async function runInStore(
  store: Store,
  workspace: Workspace,
  request: RunRequest,
  log: WorkLog,
): Promise<RunSummary> {
  const plan = await planNight({
    paths: request.paths,
    night: request.night,
    profile: request.profile,
    skip: [workspace.directory],
    onFile: (done, of) => {
      request.progress.planning(done, of);
    },
  });
  const { night, leftOut } = plan;
  const settings = { measuring: request.measuring, profile: (request.profile ?? null) as Json };
  const recipeHash = recipeHashOf(settings);
  await recordPlan(store, plan, settings as unknown as Json);
  await requeueWhatMayWorkNow(store, plan, request.again);
  const missing = (await store.pending(night, recipeHash)).length;
  request.progress.planned(plan, missing);

  const before = await store.night(night);
  const unfinished = (await store.runs(night)).some(
    (run) => run.runId === before?.currentRun && run.finishedAt === null,
  );
  const current = before?.currentRecipe === recipeHash ? before.currentRun : null;
  let measured = 0;
  let runId = current ?? '';
  if (missing > 0 || current === null || unfinished) {
    runId = newRunId();
    await store.startRun({
      ...{ runId, night, recipeHash, startedAt: new Date().toISOString(), finishedAt: null },
      ...{ stageMs: {}, spectraMeasured: 0 },
      provenance: { ...request.provenance, settings: settings as unknown as Json, inputs: inputHashes(plan) },
    });
    log.info({ night, runId, recipeHash, missing }, 'a run begins');
    measured = await measureMissing(store, workspace, request, log, { night, recipeHash, runId }, plan);
  }
  const facts = await store.facts(night);
  const counts = await store.counts(night);
  return {
    ...{ night, workspace, runId, leftOut, measured, counts },
    missing: (await store.pending(night, recipeHash)).length,
    stageMs: facts.stageMs,
    interrupted: request.signal.aborted,
  };
}

/** Writes a plan into the store. */
export async function recordPlan(store: Store, plan: NightPlan, settings: Json): Promise<void> {
  await store.saveNight({ name: plan.night, settings });
  for (const { input, spectra } of plan.inputs) await store.savePlan(input, spectra);
}

/** Files that were gone or changing when they were measured are here now; with `again`, everything is redone. */
async function requeueWhatMayWorkNow(store: Store, plan: NightPlan, again: boolean): Promise<void> {
  const here = new Set(plan.inputs.map(({ input }) => input.id));
  const spectra = again
    ? await store.expected(plan.night)
    : await store.spectraWithFault(plan.night, ['file-missing', 'file-changed']);
  const ids = spectra.filter(({ inputId }) => here.has(inputId)).map(({ spectrumId }) => spectrumId);
  await store.requeue(ids, new Date().toISOString());
}

async function measureMissing(
  store: Store,
  workspace: Workspace,
  request: RunRequest,
  log: WorkLog,
  run: { night: string; recipeHash: string; runId: string },
  plan: NightPlan,
): Promise<number> {
  const queue = await openOwnQueue(workspace.queue, log);
  const pool = openMeasurePool(request.pool);
  const verifier = createInputVerifier();
  // Planning has just read these files in full.
  verifier.trust(plan.inputs.map(({ input }): InputRecord => input));
  const stop = new AbortController();
  const machineFaults: EnvironmentFault[] = [];
  let measured = 0;
  const context = {
    ...{ store, queue, pool, verifier, log, chunkSize: request.chunkSize },
    onRows: (rows: number) => {
      measured += rows;
      request.progress.measured(measured);
    },
  };
  const handler = jobHandler(context, (fault) => {
    machineFaults.push(fault);
    stop.abort();
  });
  const worker = queue.work(handler, pool.threads, (error) => {
    log.warn({ err: error }, 'the queue reports');
  });
  try {
    await tendNight(context, run, AbortSignal.any([request.signal, stop.signal]));
  } finally {
    // Waits for the chunks in hand, which are seconds of work.
    await worker.stop();
    await pool.close();
    await queue.close();
  }
  if (machineFaults.length > 0) throw machineFaults[0]!;
  return measured;
}

/** Opens the embedded queue empty: whatever an earlier owner left is known better by the store. */
export async function openOwnQueue(directory: string, log: WorkLog): Promise<WorkQueue> {
  const folder = `${directory}/jobs`;
  layOutQueue(folder);
  try {
    const queue = await openEmbeddedQueue(folder);
    await queue.clear();
    return queue;
  } catch (error) {
    log.warn(
      { err: error as Error },
      'the queue was damaged and is made anew; the store has all that matters',
    );
    rmSync(folder, { recursive: true, force: true });
    layOutQueue(folder);
    return openEmbeddedQueue(folder);
  }
}

/** A name for a run that sorts by time and is never given twice. */
export function newRunId(): string {
  const time = new Date().toISOString().replace(/[-:]|\.\d+/g, '');
  return `${time}-${randomBytes(3).toString('hex')}`;
}

function inputHashes(plan: NightPlan): Json {
  return Object.fromEntries(plan.inputs.map(({ input }) => [input.relativePath, input.sha256]));
}
