import { spawn, type ChildProcess } from 'node:child_process';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import { type CatalogueRow, openSqliteStore } from '../../store/index.ts';
import { enqueueNight, workUntilStopped } from '../../worker/fleet.ts';
import { openRedisQueue } from '../../worker/queue.ts';
import { requeueSpectra, workspaceStatus } from '../../worker/workspace-status.ts';
import { workspaceAt } from '../../worker/workspace.ts';
import { hasOutsideTool } from '../support/outside-tool.ts';
import { freshWorkspace } from './fresh-workspace.ts';
import { practiceFolder } from './practice-folder.ts';
import { PRACTICE_POOL, practiceRun, rowsOf } from './practice-run.ts';

let folder: string;
let workspace: string;
let rowsOfOneRun: readonly CatalogueRow[];
beforeAll(async () => {
  folder = practiceFolder();
  workspace = await freshWorkspace();
  const other = await freshWorkspace();
  await practiceRun(folder, other);
  rowsOfOneRun = await rowsOf(other);
});

function enqueue(directory: string, redisUrl: string | null) {
  return enqueueNight({
    ...{ paths: [folder], night: null, profile: null, measuring: DEFAULT_MEASURING_OPTIONS },
    ...{ workspace: directory, redisUrl, chunkSize: 7, threads: 2, provenance: {} },
  });
}

/** A worker that ends when no night wants anything; tells which nights it left alone. */
async function work(directory: string, redisUrl: string | null) {
  const leftAlone: [string, number][] = [];
  const measured = await workUntilStopped({
    ...{ workspace: directory, redisUrl, chunkSize: 7, pool: PRACTICE_POOL, untilEmpty: true },
    signal: new AbortController().signal,
    onForeignRecipe: (night, missing) => leftAlone.push([night, missing]),
  });
  return { measured, leftAlone };
}

it('a night that was enqueued is measured by the next worker, to the rows of a run', async () => {
  expect(await enqueue(workspace, null)).toEqual({ night: '2031-04-02', missing: 25 });
  const [waiting] = (await workspaceStatus(workspace, new Date())).nights;
  expect(waiting).toMatchObject({ expected: 25, done: 0, waiting: 25 });
  expect(await work(workspace, null)).toEqual({ measured: 25, leftAlone: [] });
  expect(await rowsOf(workspace)).toEqual(rowsOfOneRun);
});

it('requeueSpectra() lets a worker measure the chosen spectra again and no other', async () => {
  expect(await requeueSpectra(workspace, '2031-04-02', ['2031-04-02/early#1.3', 'no such'])).toBe(1);
  expect(await work(workspace, null)).toEqual({ measured: 1, leftAlone: [] });
  expect(await rowsOf(workspace)).toEqual(rowsOfOneRun);
});

it('a worker says which night it leaves alone because it was queued under another recipe', async () => {
  const store = await openSqliteStore(workspaceAt(workspace).store);
  await store.saveNight({
    name: '2031-04-02',
    settings: { measuring: { ...DEFAULT_MEASURING_OPTIONS, gridStepLn: 2e-4 }, profile: null },
  });
  await store.requeue(['2031-04-02/early#1.3'], new Date().toISOString());
  await store.close();
  expect(await work(workspace, null)).toEqual({ measured: 0, leftAlone: [['2031-04-02', 1]] });
});

const REDIS = '/usr/bin/redis-server';
const PORT = 16_398;
const given = process.env['SHIFTWORK_TEST_REDIS_URL'];
const url = given ?? `redis://127.0.0.1:${PORT}`;
let server: ChildProcess | null = null;
afterAll(() => {
  server?.kill();
});

it.skipIf(given === undefined && !hasOutsideTool(REDIS, ['--version'], 'redis-server'))(
  'two workers share a night through Redis, each spectrum is measured once, and the rows are those of a run',
  async () => {
    if (given === undefined) {
      server = spawn(REDIS, ['--port', String(PORT), '--save', '', '--appendonly', 'no'], {
        stdio: 'ignore',
      });
      await sleep(500);
    }
    const queue = await openRedisQueue(url);
    await queue.clear();
    await queue.close();
    const shared = await freshWorkspace();
    expect(await enqueue(shared, url)).toEqual({ night: '2031-04-02', missing: 25 });
    const workers = await Promise.all([work(shared, url), work(shared, url)]);
    expect(workers.reduce((sum, { measured }) => sum + measured, 0)).toBe(25);
    expect(await rowsOf(shared)).toEqual(rowsOfOneRun);
  },
);
