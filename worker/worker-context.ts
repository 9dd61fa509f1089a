import type { Store } from '../store/index.ts';
import type { InputVerifier } from './input-verifier.ts';
import type { WorkLog } from './log.ts';
import type { MeasurePool } from './measure-pool.ts';
import type { WorkQueue } from './queue.ts';

/** What every job has at hand. */
export interface WorkerContext {
  readonly store: Store;
  readonly queue: WorkQueue;
  readonly pool: MeasurePool;
  readonly verifier: InputVerifier;
  readonly log: WorkLog;
  /** Spectra per chunk; null = from measured speed. */
  readonly chunkSize: number | null;
  /** Told after every chunk how many of its spectra have a row now. */
  readonly onRows: (rows: number) => void;
}
