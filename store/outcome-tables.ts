import type { Kysely } from 'kysely';
import { sql } from 'kysely';
import type { ExposureContext } from '../pipeline/grid/exposure-context.ts';
import { byCodeUnit } from './by-code-unit.ts';
import type {
  ExpectedSpectrum,
  Fault,
  NightReason,
  Outcome,
  TargetRecord,
  VerdictRecord,
} from './contract.ts';
import { finiteOrNull, storedJson } from './finite-or-null.ts';
import { inBatches } from './in-batches.ts';
import { candidateRows, factColumns, measurementRow } from './outcome-rows.ts';
import type { Database } from './schema.ts';

/** What is written while a night is measured and after. */

/** See Store.saveOutcomes. */
export async function saveOutcomes(
  db: Kysely<Database>,
  outcomes: readonly Outcome[],
  recipeHash: string,
  runId: string,
  measuredAt: string,
): Promise<void> {
  await db.transaction().execute(async (transaction) => {
    for (const batch of inBatches(outcomes)) {
      const ids = batch.map((outcome) => outcome.spectrumId);
      for (const table of ['measurements', 'candidates', 'curves'] as const) {
        await transaction
          .deleteFrom(table)
          .where('recipe_hash', '=', recipeHash)
          .where('spectrum_id', 'in', ids)
          .execute();
      }
      await transaction.deleteFrom('requeued').where('spectrum_id', 'in', ids).execute();
      const key = { recipeHash, runId, measuredAt };
      await transaction
        .insertInto('measurements')
        .values(batch.map((outcome) => measurementRow(outcome, key)))
        .execute();
      const candidates = batch.flatMap((outcome) => candidateRows(outcome, recipeHash));
      for (const rows of inBatches(candidates)) {
        await transaction.insertInto('candidates').values(rows).execute();
      }
      for (const { spectrumId, result, facts } of batch) {
        if ('answer' in result && result.curves !== null) {
          await transaction
            .insertInto('curves')
            .values({ spectrum_id: spectrumId, recipe_hash: recipeHash, packed: result.curves })
            .execute();
        }
        if (facts !== null) {
          await transaction
            .updateTable('spectra')
            .set(factColumns(facts))
            .where('spectrum_id', '=', spectrumId)
            .execute();
        }
      }
    }
  });
}

/** See Store.spectraWithFault. */
export async function spectraWithFault(
  db: Kysely<Database>,
  night: string,
  codes: readonly Fault['code'][],
): Promise<readonly ExpectedSpectrum[]> {
  if (codes.length === 0) return [];
  const rows = await db
    .selectFrom('spectra')
    .innerJoin('nights', 'nights.name', 'spectra.night')
    .innerJoin('measurements', (join) =>
      join
        .onRef('measurements.spectrum_id', '=', 'spectra.spectrum_id')
        .onRef('measurements.recipe_hash', '=', 'nights.current_recipe'),
    )
    .select(['spectra.spectrum_id', 'input_id', 'ordinal', 'hdu', 'row'])
    .where('spectra.night', '=', night)
    .where('measurements.fault_code', 'in', codes)
    .execute();
  return rows
    .map(({ spectrum_id, input_id, ordinal, hdu, row }) => ({
      spectrumId: spectrum_id,
      inputId: input_id,
      ordinal,
      hdu,
      row,
    }))
    .sort(byCodeUnit((spectrum) => spectrum.spectrumId));
}

/** See Store.exposureContext. */
export async function findExposureContext(
  db: Kysely<Database>,
  night: string,
  exposureKey: string,
  recipeHash: string,
): Promise<ExposureContext | null> {
  const row = await db
    .selectFrom('exposures')
    .select('context_json')
    .where('night', '=', night)
    .where('exposure_key', '=', exposureKey)
    .where('recipe_hash', '=', recipeHash)
    .executeTakeFirst();
  return row === undefined ? null : (JSON.parse(row.context_json) as ExposureContext);
}

/** See Store.saveExposureContext. */
export async function saveExposureContext(
  db: Kysely<Database>,
  night: string,
  exposureKey: string,
  recipeHash: string,
  context: ExposureContext,
): Promise<void> {
  const context_json = storedJson(context);
  await db
    .insertInto('exposures')
    .values({ night, exposure_key: exposureKey, recipe_hash: recipeHash, context_json })
    .onConflict((conflict) =>
      conflict.columns(['night', 'exposure_key', 'recipe_hash']).doUpdateSet({ context_json }),
    )
    .execute();
}

/** See Store.saveNightFindings. */
export async function saveNightFindings(
  db: Kysely<Database>,
  night: string,
  recipeHash: string,
  reasons: readonly NightReason[],
  targets: readonly TargetRecord[],
): Promise<void> {
  await db.transaction().execute(async (transaction) => {
    for (const table of ['night_reasons', 'targets'] as const) {
      await transaction
        .deleteFrom(table)
        .where('night', '=', night)
        .where('recipe_hash', '=', recipeHash)
        .execute();
    }
    const reasonRows = reasons.map(({ spectrumId, reason }) => ({
      night,
      recipe_hash: recipeHash,
      spectrum_id: spectrumId,
      word: reason.word,
      weight: reason.weight,
      reason_json: storedJson(reason),
    }));
    for (const batch of inBatches(reasonRows)) {
      await transaction.insertInto('night_reasons').values(batch).execute();
    }
    const targetRows = targets.map((target) => ({
      night,
      recipe_hash: recipeHash,
      target_key: target.targetKey,
      target_name: target.targetName,
      ra: finiteOrNull(target.raDeg),
      dec: finiteOrNull(target.decDeg),
      spectra: target.spectra,
      kind: target.kind,
      redshift: finiteOrNull(target.redshift),
      clash: Number(target.clash),
    }));
    for (const batch of inBatches(targetRows))
      await transaction.insertInto('targets').values(batch).execute();
  });
}

/** See Store.targets. */
export async function listTargets(db: Kysely<Database>, night: string): Promise<readonly TargetRecord[]> {
  const rows = await db
    .selectFrom('targets')
    .innerJoin('nights', (join) =>
      join
        .onRef('nights.name', '=', 'targets.night')
        .onRef('nights.current_recipe', '=', 'targets.recipe_hash'),
    )
    .selectAll('targets')
    .where('targets.night', '=', night)
    .execute();
  return rows
    .map((row) => ({
      targetKey: row.target_key,
      targetName: row.target_name,
      raDeg: row.ra,
      decDeg: row.dec,
      spectra: row.spectra,
      kind: row.kind as TargetRecord['kind'],
      redshift: row.redshift,
      clash: row.clash === 1,
    }))
    .sort(byCodeUnit((target) => target.targetKey));
}

/** See Store.addVerdict. The next number is taken inside the insert, so two reviewers never share one. */
export async function addVerdict(db: Kysely<Database>, verdict: VerdictRecord): Promise<void> {
  await db
    .insertInto('verdicts')
    .values({
      spectrum_id: verdict.spectrumId,
      sequence: sql<number>`(select coalesce(max(sequence), 0) + 1 from verdicts
        where spectrum_id = ${verdict.spectrumId})`,
      verdict: verdict.verdict,
      redshift: finiteOrNull(verdict.redshift),
      kind: verdict.kind,
      certainty: verdict.certainty,
      reviewer: verdict.reviewer,
      at: verdict.at,
      remark: verdict.remark,
    })
    .execute();
}
