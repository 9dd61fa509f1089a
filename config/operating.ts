import type { OptionDescription } from './option.ts';

/** How the work is done. None of it may change a number, so none of it is in the recipe. */
export interface OperatingOptions {
  readonly workspace: string;
  readonly threads: number | null;
  readonly chunk: number | null;
  readonly redisUrl: string | null;
  readonly loadLimitS: number;
  readonly spectrumLimitS: number;
  readonly threadMegabytes: number;
}

/** Each option of the work with its unit, range, default and why. */
export const OPERATING_OPTIONS: {
  readonly [K in keyof OperatingOptions]: OptionDescription<OperatingOptions[K]>;
} = {
  workspace: {
    unit: 'folder',
    range: null,
    default: './shiftwork',
    why: 'where the store, the queue, the logs and the nights live; beside the data of one survey',
  },
  threads: {
    unit: 'threads',
    range: [1, 256],
    whole: true,
    default: null,
    why: 'threads that measure; none takes one for each processor, which measures most per second',
  },
  chunk: {
    unit: 'spectra',
    range: [1, 10_000],
    whole: true,
    default: null,
    why: 'spectra of one job; none aims at five seconds of work from measured speed, so that little is lost with a worker and the queue costs nothing beside it. No answer depends on it',
  },
  redisUrl: {
    unit: 'address, redis:// or rediss://',
    range: null,
    default: null,
    why: 'the queue that several machines share; none keeps the queue inside the program, with nothing to install',
  },
  loadLimitS: {
    unit: 's',
    range: [1, 3_600],
    default: 120,
    why: 'longest time for a thread to start and load the template families, which takes seconds, a minute when the machine is busy',
  },
  spectrumLimitS: {
    unit: 's',
    range: [0.1, 600],
    default: 30,
    why: 'longest time for one spectrum, tens of times what one takes; beyond it the chunk is split to find the one at fault',
  },
  threadMegabytes: {
    unit: 'MB',
    range: [128, 16_384],
    whole: true,
    default: 1_500,
    why: 'memory of one thread; the families take about 100 MB each line spread, the largest spectrum allowed some hundreds',
  },
};
