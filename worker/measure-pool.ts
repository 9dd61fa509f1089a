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
  /** Longest time for one task, milliseconds: a base for loading, and a share for each spectrum. */
  readonly taskBaseMs: number;
  readonly taskMsPerSpectrum: number;
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
  const run = async (task: ThreadTask): Promise<unknown> => {
    const spectra = task.inputs.reduce((sum, input) => sum + input.spectra.length, 0);
    const limitMs = options.taskBaseMs + spectra * options.taskMsPerSpectrum;
    const limit = new AbortController();
    const timer = setTimeout(() => {
      limit.abort();
    }, limitMs);
    try {
      return await piscina.run(task, { signal: limit.signal });
    } catch (error) {
      throw asThreadLost(error, limit.signal.aborted, limitMs, options.threadMegabytes);
    } finally {
      clearTimeout(timer);
    }
  };
  return {
    threads: options.threads,
    chunk: (task) => run(task) as Promise<ChunkResult>,
    exposure: (task) => run(task) as Promise<ExposureContext>,
    close: () => piscina.destroy(),
  };
}

function asThreadLost(error: unknown, timedOut: boolean, limitMs: number, megabytes: number): unknown {
  if (timedOut)
    return new ThreadLost('time-limit', `the work must end within ${limitMs / 1000} s, and did not`);
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
