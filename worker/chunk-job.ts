import { NO_EXPOSURE_CONTEXT } from '../pipeline/grid/index.ts';
import type { Outcome, PendingSpectrum } from '../store/index.ts';
import { rangesOf } from './chunk-plan.ts';
import type { ChunkPayload } from './job-payloads.ts';
import { ThreadLost } from './measure-contract.ts';
import { recipeHashOf, settingsOf } from './night-settings.ts';
import type { Delivery } from './queue.ts';
import { taskInputs } from './task-inputs.ts';
import type { WorkerContext } from './worker-context.ts';

/** A spectrum alone in its chunk that took this many workers with it is set aside. */
const WORKERS_ONE_SPECTRUM_MAY_COST = 3;

/**
 * Nights of up to this many spectra keep all curves (15 kB each): whatever the comparison of the whole night
 * flags afterwards can then be plotted too. Larger ones keep those flagged by themselves and a sample.
 */
const ALL_CURVES_UP_TO = 2_000;

/**
 * Measures the spectra of a chunk that still lack a current row and writes them in one transaction. Running
 * it twice changes nothing.
 *
 * A chunk that loses its thread, or whose worker was lost, is put back as two halves; so the one spectrum at
 * fault ends alone, gets a row that says so, and its neighbours get their answers.
 */
export async function runChunk(
  context: WorkerContext,
  payload: ChunkPayload,
  delivery: Delivery,
): Promise<void> {
  const { store, log } = context;
  const pending = await store.pendingIn(payload.ranges, payload.recipeHash);
  if (pending.length === 0) return;
  if (delivery.lostBefore > 0) {
    if (pending.length > 1) {
      await splitChunk(context, payload, pending);
      return;
    }
    if (delivery.lostBefore >= WORKERS_ONE_SPECTRUM_MAY_COST) {
      const detail = `measuring this spectrum must not end the worker, and did ${delivery.lostBefore} times`;
      await setAside(context, payload, pending[0]!, new ThreadLost('memory-limit', detail));
      return;
    }
  }
  const { inputs, faults } = await taskInputs(context, pending);
  const result = { outcomes: [] as readonly Outcome[], stageMs: {} };
  if (inputs.length > 0) {
    const measuring = await measuringOf(context, payload);
    const noise =
      payload.exposureKey === null
        ? NO_EXPOSURE_CONTEXT
        : await store.exposureContext(payload.night, payload.exposureKey, payload.recipeHash);
    if (noise === null) throw new Error(`exposure ${payload.exposureKey} must be read before its chunks`);
    try {
      const { outcomes, stageMs, troubles } = await context.pool.chunk({
        kind: 'chunk',
        inputs,
        context: noise,
        measuring,
        keepAllCurves: (await store.counts(payload.night)).expected <= ALL_CURVES_UP_TO,
      });
      Object.assign(result, { outcomes, stageMs });
      for (const trouble of troubles) log.error(trouble, 'a measurement failed inside the program');
    } catch (error) {
      if (!(error instanceof ThreadLost)) throw error;
      log.warn({ spectra: pending.length, code: error.code }, error.message);
      if (pending.length > 1) await splitChunk(context, payload, pending);
      else await setAside(context, payload, pending[0]!, error);
      return;
    }
  }
  const outcomes = [...faults, ...result.outcomes];
  await store.saveOutcomes(outcomes, payload.recipeHash, payload.runId, new Date().toISOString());
  await store.addStageTimes(payload.runId, result.stageMs, result.outcomes.length);
  context.onRows(outcomes.length);
}

/** The night's options, once they are known to be the recipe the job was queued for. */
async function measuringOf({ store }: WorkerContext, payload: ChunkPayload) {
  const night = await store.night(payload.night);
  if (night === null) throw new Error(`night must be one of the store, got ${payload.night}`);
  const settings = settingsOf(night);
  const here = recipeHashOf(settings);
  if (here !== payload.recipeHash) {
    throw new Error(
      `recipe must be ${payload.recipeHash} as queued, got ${here}: this worker has another version or other ` +
        'family files, or the night was queued anew',
    );
  }
  return settings.measuring;
}

async function splitChunk(
  { queue, log }: WorkerContext,
  payload: ChunkPayload,
  pending: readonly PendingSpectrum[],
): Promise<void> {
  const middle = Math.ceil(pending.length / 2);
  const halves = [pending.slice(0, middle), pending.slice(middle)];
  log.warn({ spectra: pending.length }, 'a chunk was lost and is tried again in halves');
  await queue.add(
    halves.map((half) => ({ kind: 'chunk', payload: { ...payload, ranges: rangesOf(half) } })),
    // Content alone would be dropped when the same half was queued before under this run.
    `${payload.runId}-split-${Date.now()}`,
  );
}

async function setAside(
  context: WorkerContext,
  payload: ChunkPayload,
  spectrum: PendingSpectrum,
  lost: ThreadLost,
): Promise<void> {
  const input = await context.store.input(spectrum.inputId);
  const fault = { word: 'over-limits', code: lost.code, detail: lost.message } as const;
  const outcome: Outcome = {
    spectrumId: spectrum.spectrumId,
    inputSha256: input?.sha256 ?? null,
    facts: null,
    result: { fault },
  };
  await context.store.saveOutcomes([outcome], payload.recipeHash, payload.runId, new Date().toISOString());
  context.onRows(1);
}
