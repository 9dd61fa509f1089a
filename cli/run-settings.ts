import { availableParallelism } from 'node:os';
import type { OperatingOptions } from '../config/operating.ts';
import type { Configuration } from '../config/resolve.ts';
import type { Json } from '../store/index.ts';
import type { PoolOptions } from '../worker/index.ts';
import { programVersion } from './program-version.ts';

/** Options of the thread pool from the configuration. */
export function poolOptions(operating: OperatingOptions): PoolOptions {
  return {
    threads: operating.threads ?? availableParallelism(),
    loadLimitMs: operating.loadLimitS * 1_000,
    spectrumLimitMs: operating.spectrumLimitS * 1_000,
    threadMegabytes: operating.threadMegabytes,
  };
}

/** What a run remembers of how it was started: enough to do it again. Addresses may hold passwords: left out. */
export function provenanceOf(configuration: Configuration): { readonly [key: string]: Json } {
  const options = configuration.options
    .filter(({ name }) => name !== 'redisUrl')
    .map(({ name, value, origin }) => ({ name, value, origin }));
  return { program: 'shiftwork', version: programVersion(), node: process.version, options };
}
