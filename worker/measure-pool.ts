import { Piscina } from 'piscina';
import type { ExposureContext } from '../pipeline/grid/index.ts';
import {
  type ChunkResult,
  type ChunkTask,
  type ExposureTask,
  type ThreadTask,
  ThreadLost,
} from './measure-contract.ts';

/** Threads that measure, so that the main thread stays free to renew its jobs. */
export interface MeasurePool {
  readonly threads: number;
  /** @throws ThreadLost when the chunk took its thread with it */
  chunk(task: ChunkTask): Promise<ChunkResult>;
  /** @throws ThreadLost likewise */
  exposure(task: ExposureTask): Promise<ExposureContext>;
  close(): Promise<void>;
}

export interface PoolOptions {
  readonly threads: number;
  /** Longest time for a thread to start and load its families, milliseconds. */
  readonly loadLimitMs: number;
  /** Longest time for one spectrum, milliseconds. */
  readonly spectrumLimitMs: number;
  /** Heap of one thread, megabytes; a thread that needs more is ended. */
  readonly threadMegabytes: number;
  /** The file that runs in the threads; tests put their own in its place. */
  readonly taskFile?: URL;
}

/** In the source tree threads load TypeScript through tsx; the compiled program has JavaScript beside it. */
const IS_SOURCE = import.meta.url.endsWith('.ts');
const TASK_FILE = new URL(IS_SOURCE ? './measure-task.ts' : './measure-task.js', import.meta.url);

/** Starts the threads. */
export function openMeasurePool(options: PoolOptions): MeasurePool {
  const taskFile = options.taskFile ?? TASK_FILE;
  const piscina = new Piscina({
    filename: taskFile.href,
    minThreads: options.threads,
    maxThreads: options.threads,
    // Threads take one chunk at a time; the queue holds the rest.
    concurrentTasksPerWorker: 1,
    execArgv: taskFile.href.endsWith('.ts') ? ['--import', 'tsx'] : [],
    resourceLimits: { maxOldGenerationSizeMb: options.threadMegabytes },
  });
  // A thread lost between tasks; whoever needs one gets a new one, and a lost task rejects by itself.
  piscina.on('error', () => undefined);
  const run = async (task: ChunkTask | ExposureTask): Promise<unknown> => {
    const beat = new SharedArrayBuffer(Int32Array.BYTES_PER_ELEMENT);
    const watch = watchSteps(beat, options);
    try {
      return await piscina.run({ ...task, beat } satisfies ThreadTask, { signal: watch.signal });
    } catch (error) {
      throw asThreadLost(error, watch.exceededMs(), options.threadMegabytes);
    } finally {
      watch.end();
    }
  };
  return {
    threads: options.threads,
    chunk: (task) => run(task) as Promise<ChunkResult>,
    exposure: (task) => run(task) as Promise<ExposureContext>,
    close: () => piscina.destroy(),
  };
}

/** The thread has its task; its families are loaded: the first spectrum may begin. */
const STEPS_OF_LOADING = 2;
/** How often the steps of a thread are looked at. */
const WATCH_MS = 100;

/**
 * Aborts when a thread takes too long over one step. Steps, not chunks, are timed: a chunk may be as long as it
 * likes, and waiting for a thread to start is never held against a spectrum.
 */
function watchSteps(beat: SharedArrayBuffer, options: PoolOptions) {
  const steps = new Int32Array(beat);
  const controller = new AbortController();
  let seen = 0;
  let since = performance.now();
  let exceeded: number | null = null;
  const timer = setInterval(() => {
    const now = performance.now();
    const count = Atomics.load(steps, 0);
    if (count !== seen) {
      seen = count;
      since = now;
    }
    const limit = count < STEPS_OF_LOADING ? options.loadLimitMs : options.spectrumLimitMs;
    if (now - since > limit) {
      exceeded = limit;
      controller.abort();
    }
  }, WATCH_MS);
  return {
    signal: controller.signal,
    exceededMs: () => exceeded,
    end: () => {
      clearInterval(timer);
    },
  };
}

function asThreadLost(error: unknown, exceededMs: number | null, megabytes: number): unknown {
  if (exceededMs !== null)
    return new ThreadLost(
      'time-limit',
      `a spectrum must take at most ${exceededMs / 1_000} s, and took longer`,
    );
  const { code, message } = error as NodeJS.ErrnoException;
  if (code === 'ERR_WORKER_OUT_OF_MEMORY') {
    return new ThreadLost('memory-limit', `the work must fit in ${megabytes} MB, and did not`);
  }
  // Piscina's words for a thread that ended under its task (process.exit or a crash that spares the process).
  if (/worker exited|worker (stopped|terminated)|unexpected(ly)? exit/i.test(message)) {
    return new ThreadLost('memory-limit', `the work must not end its thread, and did: ${message}`);
  }
  return error;
}
