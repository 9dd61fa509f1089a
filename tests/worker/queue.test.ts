import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { JobOrder } from '../../worker/job-payloads.ts';
import { openEmbeddedQueue, openRedisQueue, type WorkQueue } from '../../worker/queue.ts';
import { hasOutsideTool } from '../support/outside-tool.ts';

const REDIS = '/usr/bin/redis-server';
const PORT = 16_399;

const order = (first: number): JobOrder => ({
  kind: 'chunk',
  payload: {
    ...{ night: 'n', recipeHash: 'a'.repeat(64), runId: 'r', exposureKey: null },
    ranges: [{ inputId: 'i', first, count: 1 }],
  },
});

/** What every backend must promise. */
function queueContract(backend: string, open: () => Promise<WorkQueue>): void {
  describe(`a queue on ${backend}`, () => {
    let queue: WorkQueue;
    let worker: { stop(): Promise<void> } | null = null;
    beforeAll(async () => {
      queue = await open();
      await queue.clear();
    });
    afterEach(async () => {
      await worker?.stop();
      worker = null;
      await queue.clear();
    });
    afterAll(() => queue.close());

    it('delivers every job and drops a second one of equal content and generation', async () => {
      const seen: number[] = [];
      await queue.add([order(1), order(2), order(3)], 'g1');
      await queue.add([order(2)], 'g1');
      expect(await queue.counts()).toEqual({ waiting: 3, running: 0, failed: 0 });
      worker = queue.work(
        (job) => {
          if (job.kind === 'chunk') seen.push(job.payload.ranges[0]!.first);
          return Promise.resolve();
        },
        2,
        () => undefined,
      );
      await until(async () => idle(await queue.counts()));
      expect(seen.sort((a, b) => a - b)).toEqual([1, 2, 3]);
    });

    it('delivers a job again after its handler failed once', async () => {
      let calls = 0;
      await queue.add([order(1)], 'g2');
      worker = queue.work(
        () => (++calls === 1 ? Promise.reject(new Error('planted')) : Promise.resolve()),
        1,
        () => undefined,
      );
      await until(async () => calls === 2 && idle(await queue.counts()));
      expect((await queue.counts()).failed).toBe(0);
    });

    it('never hands a payload of the wrong shape to the handler', async () => {
      let calls = 0;
      const foreign = { kind: 'chunk', payload: { path: '/etc/passwd' } } as unknown as JobOrder;
      await queue.add([foreign], 'g3');
      worker = queue.work(
        () => {
          calls++;
          return Promise.resolve();
        },
        1,
        () => undefined,
      );
      await until(async () => (await queue.counts()).failed === 1);
      expect(calls).toBe(0);
    });
  });
}

const idle = ({ waiting, running }: { waiting: number; running: number }) => waiting + running === 0;

async function until(condition: () => Promise<boolean>): Promise<void> {
  while (!(await condition())) await sleep(50);
}

queueContract('the embedded database', () => openEmbeddedQueue(null));

const hasRedis = hasOutsideTool(REDIS, ['--version'], 'redis-server');
describe.skipIf(!hasRedis)('with a server', () => {
  let server: ChildProcess;
  beforeAll(async () => {
    server = spawn(REDIS, ['--port', String(PORT), '--save', '', '--appendonly', 'no'], { stdio: 'ignore' });
    await sleep(500);
  });
  afterAll(() => {
    server.kill();
  });
  queueContract('Redis', () => openRedisQueue(`redis://127.0.0.1:${PORT}`));
});

it.skipIf(!existsSync(REDIS))(
  'openRedisQueue() says that a server out of reach is the machine at fault',
  async () => {
    await expect(openRedisQueue('redis://127.0.0.1:1')).rejects.toThrow(/refuses|does not answer/);
  },
);
