import type { MeasuringOptions } from '../config/measuring.ts';
import type { Layout } from '../pipeline/decode/index.ts';
import type { ExposureContext } from '../pipeline/grid/index.ts';
import type { FileState } from './input-file.ts';
import type { Fault, Outcome } from '../store/index.ts';

/** One file a thread is to read from. Plain data: it crosses to the thread by copy. */
export interface TaskInput {
  /** Real path; already checked to lie under the root it was queued with. */
  readonly path: string;
  readonly label: string;
  readonly state: FileState;
  readonly sha256: string;
  readonly layout: Layout;
  /** Which spectra, ascending, and what they are called. */
  readonly spectra: readonly { readonly ordinal: number; readonly spectrumId: string }[];
}

/** The spectra of one chunk. */
export interface ChunkTask {
  readonly kind: 'chunk';
  readonly inputs: readonly TaskInput[];
  readonly context: ExposureContext;
  readonly measuring: MeasuringOptions;
  /** Keep the curves of every spectrum, not only of those flagged here and of the sample. */
  readonly keepAllCurves: boolean;
}

/** What a thread hands back: one outcome per spectrum asked for, in order. */
export interface ChunkResult {
  readonly outcomes: readonly Outcome[];
  /** Milliseconds by stage, summed over the spectra; `decode` is reading, `keep` packing the curves. */
  readonly stageMs: Readonly<Record<string, number>>;
  /** Troubles that are the program's own, for the log. */
  readonly troubles: readonly { readonly spectrumId: string; readonly stack: string }[];
}

/** The files of one exposure. */
export interface ExposureTask {
  readonly kind: 'exposure';
  readonly inputs: readonly TaskInput[];
}

/** What a thread is given: the task and where it counts its steps, so that one that hangs can be told. */
export type ThreadTask = (ChunkTask | ExposureTask) & { readonly beat: SharedArrayBuffer };

/** Counts a step: the families are loaded, or one more spectrum is done. */
export function countStep(beat: SharedArrayBuffer): void {
  Atomics.add(new Int32Array(beat), 0, 1);
}

/** A thread was lost with its task: out of time, out of memory, or ended by what it worked on. */
export class ThreadLost extends Error {
  override readonly name = 'ThreadLost';
  readonly code: Extract<Fault['code'], 'time-limit' | 'memory-limit'>;

  constructor(code: 'time-limit' | 'memory-limit', detail: string) {
    super(detail);
    this.code = code;
  }
}
