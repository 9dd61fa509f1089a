import {
  createPostgresBackend,
  type Job,
  type JobsOptions,
  Queue,
  runMigrations,
  UnrecoverableError,
  withBackend,
  Worker,
} from 'bullmq';
import { createHash } from 'node:crypto';
import { Redis } from 'ioredis';
import { asEnvironmentFault, EnvironmentFault } from '../store/index.ts';
import { chunkPayload, exposurePayload, type JobOrder, nightPayload } from './job-payloads.ts';
import { openEmbeddedPool } from './pglite-backend.ts';

/** One queue for all kinds: order between them is kept by who adds what when, and counts are one question. */
const QUEUE_NAME = 'shiftwork';
/** Hash tag: on a Redis cluster all keys of the queue live on one node. */
const REDIS_PREFIX = '{shiftwork}';
/** Schema inside the embedded database. */
const SCHEMA = 'bullmq';

/**
 * A worker that dies is noticed after about the sum of these. Computing happens in threads, so the main
 * thread always renews in time; a blocked main thread once made two workers run one job.
 */
const LOCK_MS = 15_000;
const STALLED_CHECK_MS = 5_000;
/** How often a job may lose its worker before it is given up; chunks are split long before. */
const STALLS_ALLOWED = 20;

const JOB_OPTIONS: JobsOptions = {
  attempts: 3,
  backoff: { type: 'exponential', delay: 1_000 },
  removeOnComplete: { count: 1_000, age: 86_400 },
  removeOnFail: { count: 10_000 },
};

export interface QueueCounts {
  readonly waiting: number;
  readonly running: number;
  readonly failed: number;
}

/** How a job reached its handler. */
export interface Delivery {
  /** How often a worker took this job and was lost, 0 for most. */
  readonly lostBefore: number;
}

export type JobHandler = (order: JobOrder, delivery: Delivery) => Promise<void>;

/** Jobs to be done, delivered at least once. */
export interface WorkQueue {
  /** Adds jobs. One with the same content and `generation` as an earlier one is dropped. */
  add(orders: readonly JobOrder[], generation: string): Promise<void>;
  /**
   * Takes jobs and hands them to `handler` until stopped.
   *
   * @param atOnce jobs handled side by side
   * @param onTrouble told about failed jobs and connection errors
   */
  work(handler: JobHandler, atOnce: number, onTrouble: (error: Error) => void): { stop(): Promise<void> };
  counts(): Promise<QueueCounts>;
  /** Forgets every job, running ones included. */
  clear(): Promise<void>;
  close(): Promise<void>;
}

/** The classes of one backend with its connection filled in. */
interface Backend {
  readonly makeQueue: () => Queue;
  readonly makeWorker: (handle: (job: Job) => Promise<void>, atOnce: number) => Worker;
  readonly end: () => Promise<void>;
}

/**
 * The queue inside this process, kept in `directory`.
 *
 * @param directory only one process may hold it; null keeps it in memory
 * @throws Error when the directory is damaged: remove it and open again, the store refills it
 */
export async function openEmbeddedQueue(directory: string | null): Promise<WorkQueue> {
  const pool = await openEmbeddedPool(directory);
  await runMigrations(pool, SCHEMA);
  await pool.query(`set search_path to ${SCHEMA}`);
  const classes = withBackend(createPostgresBackend);
  const connection = pool as never;
  return queueOver({
    makeQueue: () => new classes.Queue(QUEUE_NAME, { connection, defaultJobOptions: JOB_OPTIONS }) as never,
    makeWorker: (handle, atOnce) =>
      new classes.Worker(QUEUE_NAME, handle, { connection, ...workerOptions(atOnce) }) as never,
    end: () => pool.end(),
  });
}

/**
 * The queue on a Redis server that many workers share.
 *
 * @param url redis:// or rediss://
 * @throws EnvironmentFault when the server does not answer
 */
export async function openRedisQueue(url: string): Promise<WorkQueue> {
  const connection = new Redis(url, {
    maxRetriesPerRequest: null,
    lazyConnect: true,
    retryStrategy: retryDelay,
  });
  // Without a listener a lost connection would end the process; BullMQ reports it through the worker.
  const errors: Error[] = [];
  connection.on('error', (error: Error) => {
    errors.push(error);
    errors.splice(0, errors.length - 1);
  });
  try {
    await connection.connect();
  } catch (error) {
    connection.disconnect();
    // The promise only says that the connection is closed; the event before it says why.
    const why = errors[0] ?? (error as Error);
    const known = asEnvironmentFault(why);
    throw known instanceof EnvironmentFault
      ? known
      : new EnvironmentFault(`the queue's server cannot be used: ${why.message}`, why);
  }
  return queueOver({
    makeQueue: () =>
      new Queue(QUEUE_NAME, { connection, prefix: REDIS_PREFIX, defaultJobOptions: JOB_OPTIONS }),
    makeWorker: (handle, atOnce) =>
      new Worker(QUEUE_NAME, handle, { connection, prefix: REDIS_PREFIX, ...workerOptions(atOnce) }),
    end: async () => {
      await connection.quit();
    },
  });
}

function workerOptions(concurrency: number) {
  return {
    concurrency,
    lockDuration: LOCK_MS,
    stalledInterval: STALLED_CHECK_MS,
    maxStalledCount: STALLS_ALLOWED,
  };
}

/** Comes back within five seconds of a server's return. */
function retryDelay(attempt: number): number {
  return Math.min(5_000, 100 * 2 ** Math.min(attempt, 6));
}

function queueOver(backend: Backend): WorkQueue {
  const queue = backend.makeQueue();
  queue.on('error', () => undefined);
  return {
    add: async (orders, generation) => {
      await queue.addBulk(
        orders.map((order) => ({
          name: order.kind,
          data: order.payload,
          opts: { jobId: jobId(order, generation) },
        })),
      );
    },
    work: (handler, atOnce, onTrouble) => {
      const worker = backend.makeWorker(async (job) => {
        await handler(checkedOrder(job.name, job.data), { lostBefore: job.stalledCounter });
      }, atOnce);
      worker.on('failed', (_job, error) => {
        onTrouble(error);
      });
      worker.on('error', onTrouble);
      return { stop: () => worker.close() };
    },
    counts: async () => {
      const counts = await queue.getJobCounts('waiting', 'prioritized', 'delayed', 'active', 'failed');
      return {
        waiting: (counts['waiting'] ?? 0) + (counts['prioritized'] ?? 0) + (counts['delayed'] ?? 0),
        running: counts['active'] ?? 0,
        failed: counts['failed'] ?? 0,
      };
    },
    clear: () => queue.obliterate({ force: true }),
    close: async () => {
      await queue.close();
      await backend.end();
    },
  };
}

/** BullMQ allows neither colons nor pure integers in job ids, so the content is hashed. */
function jobId(order: JobOrder, generation: string): string {
  const content = createHash('sha256').update(JSON.stringify(order.payload)).digest('hex');
  return `${order.kind}-${generation}-${content.slice(0, 24)}`;
}

/** @throws UnrecoverableError when the payload is not what this program puts on a queue */
function checkedOrder(kind: string, data: unknown): JobOrder {
  const parsed =
    kind === 'exposure'
      ? exposurePayload.safeParse(data)
      : kind === 'chunk'
        ? chunkPayload.safeParse(data)
        : nightPayload.safeParse(data);
  if (!['exposure', 'chunk', 'night'].includes(kind) || !parsed.success) {
    throw new UnrecoverableError(`job must be an exposure, chunk or night of this program, got ${kind}`);
  }
  return { kind, payload: parsed.data } as JobOrder;
}
