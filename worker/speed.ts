import { chunkSize } from './chunk-plan.ts';
import type { MeasurePool } from './measure-pool.ts';
import type { WorkerContext } from './worker-context.ts';

/** What planning chunks needs to know. */
export type SpeedContext = Pick<WorkerContext, 'store' | 'chunkSize'> & {
  readonly pool: Pick<MeasurePool, 'threads'>;
};

/** Spectra per chunk: the option, else from how long spectra took in the latest run of the night that measured. */
export async function chunkSizeFor(context: SpeedContext, night: string, spectra: number): Promise<number> {
  if (context.chunkSize !== null) return context.chunkSize;
  const runs = await context.store.runs(night);
  const measured = runs.filter((run) => run.spectraMeasured > 0).at(-1);
  const total = Object.values(measured?.stageMs ?? {}).reduce((sum, ms) => sum + ms, 0);
  const msPerSpectrum = measured === undefined ? null : total / measured.spectraMeasured;
  return chunkSize(spectra, context.pool.threads, msPerSpectrum);
}
