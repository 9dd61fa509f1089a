import { type Kysely, sql } from 'kysely';
import type { Layout } from '../pipeline/decode/layout.ts';
import type { TargetRow } from '../pipeline/decode/target-row.ts';
import type { InputFaultCode } from '../pipeline/errors.ts';
import { byCodeUnit } from './by-code-unit.ts';
import type {
  ExpectedSpectrum,
  InputRecord,
  Json,
  NightRecord,
  OrdinalRange,
  PendingSpectrum,
  PlannedSpectrum,
} from './contract.ts';
import { finiteOrNull, storedJson } from './finite-or-null.ts';
import { inBatches } from './in-batches.ts';
import type { Database, InputTable } from './schema.ts';

/** Nights, inputs and the spectra expected of them: what is known before anything is measured. */

/** See Store.saveNight. */
export async function saveNight(db: Kysely<Database>, night: Pick<NightRecord, 'name' | 'settings'>) {
  const settings_json = storedJson(night.settings);
  await db
    .insertInto('nights')
    .values({ name: night.name, current_recipe: null, current_run: null, settings_json })
    .onConflict((conflict) => conflict.column('name').doUpdateSet({ settings_json }))
    .execute();
}

/** See Store.nights. */
export async function listNights(db: Kysely<Database>): Promise<readonly NightRecord[]> {
  const rows = await db.selectFrom('nights').selectAll().execute();
  return rows
    .map((row) => ({
      name: row.name,
      currentRecipe: row.current_recipe,
      currentRun: row.current_run,
      settings: JSON.parse(row.settings_json) as Json,
    }))
    .sort(byCodeUnit((night) => night.name));
}

/** See Store.savePlan. */
export async function savePlan(
  db: Kysely<Database>,
  input: InputRecord,
  expected: readonly PlannedSpectrum[],
): Promise<void> {
  const row = inputRow(input);
  await db.transaction().execute(async (transaction) => {
    const known = await transaction
      .selectFrom('inputs')
      .select('sha256')
      .where('id', '=', input.id)
      .executeTakeFirst();
    await transaction
      .insertInto('inputs')
      .values(row)
      .onConflict((conflict) => conflict.column('id').doUpdateSet(row))
      .execute();
    const before = await transaction
      .selectFrom('spectra')
      .select(['spectrum_id', 'ordinal', 'hdu', 'row'])
      .where('input_id', '=', input.id)
      .orderBy('ordinal')
      .execute();
    const sameAsBefore =
      before.length === expected.length &&
      before.every(({ spectrum_id, ordinal, hdu, row }, i) => {
        const now = expected[i]!;
        return (
          spectrum_id === now.spectrumId && ordinal === now.ordinal && hdu === now.hdu && row === now.row
        );
      });
    // What was read of the spectra is kept when the file is the same.
    if (sameAsBefore && known?.sha256 === input.sha256) return;
    await transaction.deleteFrom('spectra').where('input_id', '=', input.id).execute();
    const rows = expected.map((spectrum) => ({
      spectrum_id: spectrum.spectrumId,
      night: input.night,
      input_id: input.id,
      ordinal: spectrum.ordinal,
      hdu: spectrum.hdu,
      row: spectrum.row,
      ...targetColumns(spectrum.target),
    }));
    for (const batch of inBatches(rows)) await transaction.insertInto('spectra').values(batch).execute();
  });
}

/** Kept from the plan on, so that a spectrum nobody can read is still known by its target. */
function targetColumns(target: TargetRow | null) {
  return {
    target_name: target?.name ?? null,
    ra: finiteOrNull(target?.raDeg),
    dec: finiteOrNull(target?.decDeg),
    fibre: target?.fibre ?? null,
    role: target?.role ?? 'target',
    target_class: target?.targetClass ?? null,
    magnitude: finiteOrNull(target?.magnitude),
    magnitude_band: target?.magnitude === null ? null : (target?.magnitudeBand ?? null),
  };
}

function inputRow(input: InputRecord): InputTable {
  return {
    id: input.id,
    night: input.night,
    path: input.path,
    root: input.root,
    relative_path: input.relativePath,
    size_bytes: input.sizeBytes,
    modified_ms: input.modifiedMs,
    inode: input.inode,
    sha256: input.sha256,
    layout_json: input.layout === null ? null : storedJson(input.layout),
    fault_code: input.fault?.code ?? null,
    fault_detail: input.fault?.detail ?? null,
    exposure_key: input.exposureKey,
  };
}

function inputOf(row: InputTable): InputRecord {
  return {
    id: row.id,
    night: row.night,
    path: row.path,
    root: row.root,
    relativePath: row.relative_path,
    sizeBytes: row.size_bytes,
    modifiedMs: row.modified_ms,
    inode: row.inode,
    sha256: row.sha256,
    layout: row.layout_json === null ? null : (JSON.parse(row.layout_json) as Layout),
    fault:
      row.fault_code === null
        ? null
        : { code: row.fault_code as InputFaultCode, detail: row.fault_detail ?? '' },
    exposureKey: row.exposure_key,
  };
}

/** See Store.inputs. */
export async function listInputs(db: Kysely<Database>, night: string): Promise<readonly InputRecord[]> {
  const rows = await db.selectFrom('inputs').selectAll().where('night', '=', night).execute();
  return rows.map(inputOf).sort(byCodeUnit((input) => input.id));
}

/** See Store.input. */
export async function findInput(db: Kysely<Database>, inputId: string): Promise<InputRecord | null> {
  const row = await db.selectFrom('inputs').selectAll().where('id', '=', inputId).executeTakeFirst();
  return row === undefined ? null : inputOf(row);
}

function pendingQuery(db: Kysely<Database>, recipeHash: string) {
  return db
    .selectFrom('spectra')
    .innerJoin('inputs', 'inputs.id', 'spectra.input_id')
    .leftJoin('measurements', (join) =>
      join
        .onRef('measurements.spectrum_id', '=', 'spectra.spectrum_id')
        .on('measurements.recipe_hash', '=', recipeHash),
    )
    .leftJoin('requeued', 'requeued.spectrum_id', 'spectra.spectrum_id')
    .select([
      'spectra.spectrum_id',
      'spectra.input_id',
      'spectra.ordinal',
      'spectra.hdu',
      'spectra.row',
      'inputs.exposure_key',
    ])
    .where((eb) =>
      eb.or([
        eb('measurements.spectrum_id', 'is', null),
        eb('requeued.spectrum_id', 'is not', null),
        sql<boolean>`measurements.input_sha256 is distinct from inputs.sha256`,
      ]),
    );
}

interface PendingRow {
  spectrum_id: string;
  input_id: string;
  ordinal: number;
  hdu: number | null;
  row: number | null;
  exposure_key: string | null;
}

function pendingOf(row: PendingRow): PendingSpectrum {
  return {
    spectrumId: row.spectrum_id,
    inputId: row.input_id,
    ordinal: row.ordinal,
    hdu: row.hdu,
    row: row.row,
    exposureKey: row.exposure_key,
  };
}

/** See Store.pending. */
export async function listPending(db: Kysely<Database>, night: string, recipeHash: string) {
  const rows = await pendingQuery(db, recipeHash).where('spectra.night', '=', night).execute();
  return rows.map(pendingOf).sort(byCodeUnit((spectrum) => spectrum.spectrumId));
}

/** See Store.pendingIn. */
export async function listPendingIn(
  db: Kysely<Database>,
  ranges: readonly OrdinalRange[],
  recipeHash: string,
): Promise<readonly PendingSpectrum[]> {
  const found: PendingSpectrum[] = [];
  for (const { inputId, first, count } of ranges) {
    const rows = await pendingQuery(db, recipeHash)
      .where('spectra.input_id', '=', inputId)
      .where('spectra.ordinal', '>=', first)
      .where('spectra.ordinal', '<', first + count)
      .execute();
    found.push(...rows.map(pendingOf).sort((a, b) => a.ordinal - b.ordinal));
  }
  return found;
}

/** See Store.expected. */
export async function listExpected(
  db: Kysely<Database>,
  night: string,
): Promise<readonly ExpectedSpectrum[]> {
  const rows = await db
    .selectFrom('spectra')
    .select(['spectrum_id', 'input_id', 'ordinal', 'hdu', 'row'])
    .where('night', '=', night)
    .execute();
  return rows
    .map((row) => pendingOf({ ...row, exposure_key: null }))
    .sort(byCodeUnit((spectrum) => spectrum.spectrumId));
}

/** See Store.requeue. */
export async function requeue(
  db: Kysely<Database>,
  spectrumIds: readonly string[],
  at: string,
): Promise<number> {
  return db.transaction().execute(async (transaction) => {
    let marked = 0;
    for (const batch of inBatches(spectrumIds)) {
      const known = await transaction
        .selectFrom('spectra')
        .select('spectrum_id')
        .where('spectrum_id', 'in', batch)
        .execute();
      if (known.length === 0) continue;
      await transaction
        .insertInto('requeued')
        .values(known.map(({ spectrum_id }) => ({ spectrum_id, asked_at: at })))
        .onConflict((conflict) => conflict.column('spectrum_id').doUpdateSet({ asked_at: at }))
        .execute();
      marked += known.length;
    }
    return marked;
  });
}
