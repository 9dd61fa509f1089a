import { asEnvironmentFault, EnvironmentFault } from '../store/index.ts';
import { runChunk } from './chunk-job.ts';
import { runExposure } from './exposure-job.ts';
import { runNightJob } from './night-job.ts';
import type { JobHandler } from './queue.ts';
import type { WorkerContext } from './worker-context.ts';

/**
 * The handler of all three kinds of job.
 *
 * @param onEnvironmentFault told when the machine is at fault (full disk, lost server), so that the worker can
 *   stop instead of failing every chunk of the night
 */
export function jobHandler(
  context: WorkerContext,
  onEnvironmentFault: (fault: EnvironmentFault) => void,
): JobHandler {
  return async (order, delivery) => {
    try {
      if (order.kind === 'exposure') await runExposure(context, order.payload);
      else if (order.kind === 'chunk') await runChunk(context, order.payload, delivery);
      else await runNightJob(context, order.payload);
    } catch (error) {
      const known = asEnvironmentFault(error);
      if (known instanceof EnvironmentFault) onEnvironmentFault(known);
      context.log.error({ kind: order.kind, payload: order.payload, err: known }, 'a job failed');
      throw known;
    }
  };
}
