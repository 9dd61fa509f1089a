import type { Kysely } from 'kysely';
import type { Store } from './contract.ts';
import { asEnvironmentFault } from './environment-fault.ts';
import * as outcomes from './outcome-tables.ts';
import * as plan from './plan-tables.ts';
import * as read from './read-tables.ts';
import * as runs from './run-tables.ts';
import type { Database } from './schema.ts';

/**
 * The store over any database the query builder speaks.
 *
 * @param db migrated (see migrations.ts); closed with the store
 */
export function createStore(db: Kysely<Database>): Store {
  const guarded =
    <Arguments extends unknown[], Result>(
      operation: (db: Kysely<Database>, ...rest: Arguments) => Promise<Result>,
    ) =>
    async (...rest: Arguments): Promise<Result> => {
      try {
        return await operation(db, ...rest);
      } catch (error) {
        throw asEnvironmentFault(error);
      }
    };
  const nights = guarded(plan.listNights);
  return {
    saveNight: guarded(plan.saveNight),
    night: async (name) => (await nights()).find((night) => night.name === name) ?? null,
    nights,
    startRun: guarded(runs.startRun),
    addStageTimes: guarded(runs.addStageTimes),
    finishRun: guarded(runs.finishRun),
    runs: guarded(runs.listRuns),
    savePlan: guarded(plan.savePlan),
    inputs: guarded(plan.listInputs),
    input: guarded(plan.findInput),
    pending: guarded(plan.listPending),
    pendingIn: guarded(plan.listPendingIn),
    counts: guarded(runs.countNight),
    exposureContext: guarded(outcomes.findExposureContext),
    saveExposureContext: guarded(outcomes.saveExposureContext),
    saveOutcomes: guarded(outcomes.saveOutcomes),
    spectraWithFault: guarded(outcomes.spectraWithFault),
    expected: guarded(plan.listExpected),
    requeue: guarded(plan.requeue),
    saveNightFindings: guarded(outcomes.saveNightFindings),
    targets: guarded(outcomes.listTargets),
    addVerdict: guarded(outcomes.addVerdict),
    facts: guarded(runs.nightFacts),
    rows: guarded(read.catalogueRows),
    details: guarded(read.spectrumDetails),
    close: () => db.destroy(),
  };
}
