import type { Kysely } from 'kysely';
import type { Json, NightCounts, RunRecord } from './contract.ts';
import { storedJson } from './finite-or-null.ts';
import type { NightFacts } from './night-reader.ts';
import type { Database } from './schema.ts';

/** Runs over a night, and how far it is. */

/** See Store.startRun. */
export async function startRun(db: Kysely<Database>, run: RunRecord): Promise<void> {
  await db.transaction().execute(async (transaction) => {
    await transaction
      .insertInto('runs')
      .values({
        run_id: run.runId,
        night: run.night,
        recipe_hash: run.recipeHash,
        started_at: run.startedAt,
        finished_at: run.finishedAt,
        stage_ms_json: storedJson(run.stageMs),
        spectra_measured: run.spectraMeasured,
        provenance_json: storedJson(run.provenance),
      })
      .execute();
    await transaction
      .updateTable('nights')
      .set({ current_recipe: run.recipeHash, current_run: run.runId })
      .where('name', '=', run.night)
      .execute();
  });
}

/** See Store.addStageTimes. */
export async function addStageTimes(
  db: Kysely<Database>,
  runId: string,
  stageMs: Readonly<Record<string, number>>,
  spectra: number,
): Promise<void> {
  await db.transaction().execute(async (transaction) => {
    const row = await transaction
      .selectFrom('runs')
      .select(['stage_ms_json', 'spectra_measured'])
      .where('run_id', '=', runId)
      .executeTakeFirst();
    if (row === undefined) return;
    await transaction
      .updateTable('runs')
      .set({
        stage_ms_json: storedJson(sumOf(JSON.parse(row.stage_ms_json) as Record<string, number>, stageMs)),
        spectra_measured: row.spectra_measured + spectra,
      })
      .where('run_id', '=', runId)
      .execute();
  });
}

function sumOf(a: Readonly<Record<string, number>>, b: Readonly<Record<string, number>>) {
  const sum: Record<string, number> = { ...a };
  for (const [stage, ms] of Object.entries(b)) sum[stage] = (sum[stage] ?? 0) + ms;
  return sum;
}

/** See Store.finishRun. */
export async function finishRun(db: Kysely<Database>, runId: string, finishedAt: string): Promise<void> {
  await db.updateTable('runs').set({ finished_at: finishedAt }).where('run_id', '=', runId).execute();
}

/** See Store.runs. Oldest first. */
export async function listRuns(db: Kysely<Database>, night: string): Promise<readonly RunRecord[]> {
  const rows = await db
    .selectFrom('runs')
    .selectAll()
    .where('night', '=', night)
    .orderBy('started_at')
    .orderBy('run_id')
    .execute();
  return rows.map((row) => ({
    runId: row.run_id,
    night: row.night,
    recipeHash: row.recipe_hash,
    startedAt: row.started_at,
    finishedAt: row.finished_at,
    stageMs: JSON.parse(row.stage_ms_json) as Record<string, number>,
    spectraMeasured: row.spectra_measured,
    provenance: JSON.parse(row.provenance_json) as Json,
  }));
}

/** See Store.counts. */
export async function countNight(db: Kysely<Database>, night: string): Promise<NightCounts> {
  const row = await db
    .selectFrom('spectra')
    .innerJoin('nights', 'nights.name', 'spectra.night')
    .innerJoin('inputs', 'inputs.id', 'spectra.input_id')
    .leftJoin('measurements', (join) =>
      join
        .onRef('measurements.spectrum_id', '=', 'spectra.spectrum_id')
        .onRef('measurements.recipe_hash', '=', 'nights.current_recipe'),
    )
    .select(({ fn }) => [
      fn.count('spectra.spectrum_id').as('expected'),
      fn.count('measurements.spectrum_id').as('done'),
      fn.count('measurements.fault_code').as('faults'),
      fn.sum('measurements.needs_review').as('needs_review'),
    ])
    .where('spectra.night', '=', night)
    .executeTakeFirstOrThrow();
  return {
    expected: Number(row.expected),
    done: Number(row.done),
    faults: Number(row.faults),
    needsReview: Number(row.needs_review),
  };
}

/** See Store.facts. */
export async function nightFacts(db: Kysely<Database>, name: string): Promise<NightFacts> {
  const night = await db.selectFrom('nights').selectAll().where('name', '=', name).executeTakeFirst();
  if (night === undefined) throw new RangeError(`night must be one of the store, got ${name}`);
  const counts = await countNight(db, name);
  const runs = (await listRuns(db, name)).filter((run) => run.recipeHash === night.current_recipe);
  const current = runs.find((run) => run.runId === night.current_run);
  const spectra = runs.reduce((total, run) => total + run.spectraMeasured, 0);
  const total = runs.reduce<Record<string, number>>((sum, run) => sumOf(sum, run.stageMs), {});
  return {
    name,
    recipeHash: night.current_recipe,
    runId: night.current_run,
    expected: counts.expected,
    measured: counts.done,
    startedAt: current?.startedAt ?? null,
    finishedAt: current?.finishedAt ?? null,
    stageMs: Object.fromEntries(
      Object.entries(total).map(([stage, ms]) => [stage, ms / Math.max(1, spectra)]),
    ),
    provenance: (current?.provenance ?? {}) as Record<string, unknown>,
  };
}
