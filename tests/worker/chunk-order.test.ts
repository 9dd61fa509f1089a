import { beforeAll, expect, it } from 'vitest';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import { seededRandom } from '../../pipeline/core/random.ts';
import { type CatalogueRow, openSqliteStore } from '../../store/index.ts';
import { enqueueNight } from '../../worker/fleet.ts';
import { jobHandler } from '../../worker/handle-job.ts';
import { createInputVerifier } from '../../worker/input-verifier.ts';
import type { ChunkPayload, JobOrder } from '../../worker/job-payloads.ts';
import { NO_LOG } from '../../worker/log.ts';
import { openMeasurePool } from '../../worker/measure-pool.ts';
import type { WorkQueue } from '../../worker/queue.ts';
import { openOwnQueue } from '../../worker/run-night.ts';
import { tendNight } from '../../worker/tend-night.ts';
import { workspaceAt } from '../../worker/workspace.ts';
import { freshWorkspace } from './fresh-workspace.ts';
import { practiceFolder } from './practice-folder.ts';
import { PRACTICE_POOL, practiceRun, rowsOf } from './practice-run.ts';

const SEED = Number(process.env['SHIFTWORK_TEST_SEED'] ?? 20_310_404);

let folder: string;
let rowsOfOneRun: readonly CatalogueRow[];
beforeAll(async () => {
  folder = practiceFolder();
  const workspace = await freshWorkspace();
  await practiceRun(folder, workspace);
  rowsOfOneRun = await rowsOf(workspace);
});

/** Deals the rows of an exposure anew: any row in any chunk at any place. */
function shuffled(orders: readonly JobOrder[], size: number, random: () => number): readonly JobOrder[] {
  const chunks = orders.filter((order) => order.kind === 'chunk').map(({ payload }) => payload);
  if (chunks.length === 0) return orders;
  const dealt: ChunkPayload[] = [];
  for (const key of new Set(chunks.map(({ exposureKey }) => exposureKey))) {
    const group = chunks.filter(({ exposureKey }) => exposureKey === key);
    const rows = group
      .flatMap(({ ranges }) => ranges)
      .flatMap(({ inputId, first, count }) =>
        Array.from({ length: count }, (_, i) => ({ inputId, first: first + i, count: 1 })),
      );
    inRandomOrder(rows, random);
    for (let at = 0; at < rows.length; at += size) {
      dealt.push({ ...group[0]!, ranges: rows.slice(at, at + size) });
    }
  }
  inRandomOrder(dealt, random);
  const others = orders.filter(({ kind }) => kind !== 'chunk');
  return [...others, ...dealt.map((payload): JobOrder => ({ kind: 'chunk', payload }))];
}

/** Fisher & Yates' shuffle, in place. */
function inRandomOrder(values: unknown[], random: () => number): void {
  for (let last = values.length - 1; last > 0; last--) {
    const other = Math.floor(random() * (last + 1));
    [values[last], values[other]] = [values[other], values[last]];
  }
}

/** A run whose queue hands its chunks on dealt anew. */
async function shuffledRun(workspace: string, size: number): Promise<void> {
  const run = {
    ...{ paths: [folder], night: null, profile: null, measuring: DEFAULT_MEASURING_OPTIONS },
    ...{ workspace, redisUrl: null, chunkSize: size, threads: 2, provenance: {} },
  };
  const { night } = await enqueueNight(run);
  const store = await openSqliteStore(workspaceAt(workspace).store);
  const { runId, recipeHash } = (await store.runs(night))[0]!;
  const inner = await openOwnQueue(workspaceAt(workspace).queue, NO_LOG);
  const random = seededRandom(SEED + size);
  const queue: WorkQueue = {
    ...inner,
    add: (orders, generation) =>
      inner.add(
        shuffled(orders, size, () => random.uniform()),
        generation,
      ),
  };
  const pool = openMeasurePool(PRACTICE_POOL);
  const context = {
    ...{ store, queue, pool, verifier: createInputVerifier(), log: NO_LOG, chunkSize: size },
    onRows: () => undefined,
  };
  const ignore = () => undefined;
  const worker = queue.work(jobHandler(context, ignore), pool.threads, ignore);
  await tendNight(context, { night, runId, recipeHash }, new AbortController().signal);
  await worker.stop();
  await pool.close();
  await queue.close();
  await store.close();
}

it.each([1, 7, 240])(
  'chunks of %i rows, dealt in any order, give the rows of a run in file order',
  async (size) => {
    console.log(`seed ${SEED} (SHIFTWORK_TEST_SEED)`);
    const workspace = await freshWorkspace();
    await shuffledRun(workspace, size);
    expect(await rowsOf(workspace)).toEqual(rowsOfOneRun);
  },
);
