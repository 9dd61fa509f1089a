import { type Kysely, sql } from 'kysely';
import type { Database } from './schema.ts';

/** What differs between backends in a table definition. */
export interface ColumnTypes {
  readonly real: string;
  readonly bytes: string;
  /** Whole numbers up to 2^53. */
  readonly whole: string;
}

interface Migration {
  readonly version: number;
  readonly statements: (types: ColumnTypes) => readonly string[];
}

const REAL_MEASURED = [
  ...['redshift', 'redshift_error', 'velocity_km_s', 'velocity_error_km_s'],
  ...['confidence', 'confidence_without_prior'],
  ...['probability_galaxy', 'probability_quasar', 'probability_star', 'probability_none'],
  ...['runner_up_redshift', 'runner_up_confidence', 'correlation_peak', 'correlation_r'],
  ...['chi_square', 'degrees_of_freedom', 'chi_square_margin', 'signal_to_noise_per_angstrom'],
  ...['good_fraction', 'noise_factor', 'noise_correlation', 'strongest_line_snr'],
  'barycentric_correction_km_s',
];

/**
 * Forward only, numbered from 1, never edited once released: a store remembers which it has had.
 * Text keys collate by code unit on SQLite; lists are sorted by the store itself, so no backend's collation
 * shows.
 */
export const MIGRATIONS: readonly Migration[] = [
  {
    version: 1,
    statements: ({ real, bytes, whole }) => [
      `create table nights (name text primary key, current_recipe text, current_run text,
        settings_json text not null)`,
      `create table runs (run_id text primary key, night text not null references nights(name),
        recipe_hash text not null, started_at text not null, finished_at text, stage_ms_json text not null,
        spectra_measured integer not null, provenance_json text not null)`,
      `create index runs_night on runs (night, started_at)`,
      `create table inputs (id text primary key, night text not null references nights(name),
        path text not null, root text not null, relative_path text not null, size_bytes ${whole} not null,
        modified_ms ${real} not null, inode text not null, sha256 text, layout_json text, fault_code text,
        fault_detail text, exposure_key text, unique (night, path))`,
      `create table spectra (spectrum_id text primary key, night text not null references nights(name),
        input_id text not null references inputs(id), ordinal integer not null, hdu integer, row integer,
        target_name text, ra ${real}, dec ${real}, field text, exposure_id text, fibre integer,
        role text not null, target_class text, observed_at text, exposure_s ${real}, magnitude ${real},
        magnitude_band text, frame_as_read text, unique (input_id, ordinal))`,
      `create index spectra_night on spectra (night)`,
      // Measurements, candidates, curves and verdicts outlive a change of plan, so they refer to no table.
      `create table requeued (spectrum_id text primary key, asked_at text not null)`,
      `create table exposures (night text not null, exposure_key text not null, recipe_hash text not null,
        context_json text not null, primary key (night, exposure_key, recipe_hash))`,
      `create table measurements (spectrum_id text not null, recipe_hash text not null, run_id text not null,
        measured_at text not null, input_sha256 text, fault_code text, kind text, family text,
        ${REAL_MEASURED.map((column) => `${column} ${real}`).join(', ')},
        needs_review integer not null, reasons_json text not null, runner_up_kind text,
        lines_detected integer, barycentric_source text, calibration_id text, lines_json text not null, features_json text not null,
        primary key (spectrum_id, recipe_hash))`,
      `create table candidates (spectrum_id text not null, recipe_hash text not null, place integer not null,
        kind text not null, family text not null, redshift ${real} not null, redshift_error ${real},
        chi_square ${real}, degrees_of_freedom ${real}, probability ${real}, correlation_peak ${real},
        correlation_r ${real}, primary key (spectrum_id, recipe_hash, place))`,
      `create table curves (spectrum_id text not null, recipe_hash text not null, packed ${bytes} not null,
        primary key (spectrum_id, recipe_hash))`,
      `create table night_reasons (night text not null, recipe_hash text not null, spectrum_id text not null,
        word text not null, weight text not null, reason_json text not null,
        primary key (spectrum_id, recipe_hash, word))`,
      `create index night_reasons_night on night_reasons (night, recipe_hash)`,
      `create table targets (night text not null, recipe_hash text not null, target_key text not null,
        target_name text, ra ${real}, dec ${real}, spectra integer not null, kind text, redshift ${real},
        clash integer not null, primary key (night, recipe_hash, target_key))`,
      `create table verdicts (spectrum_id text not null, sequence integer not null, verdict text not null,
        redshift ${real}, kind text, certainty text not null, reviewer text not null, at text not null,
        remark text, primary key (spectrum_id, sequence))`,
    ],
  },
];

/**
 * Brings a store up to date, each step in a transaction of its own together with its number.
 *
 * @throws RangeError when the store has had migrations this program does not know (it is from a newer one)
 */
export async function migrate(db: Kysely<Database>, types: ColumnTypes): Promise<void> {
  await sql`create table if not exists migrations_done (version integer primary key)`.execute(db);
  const done = await sql<{ version: number }>`select version from migrations_done`.execute(db);
  const newest = Math.max(0, ...done.rows.map((row) => row.version));
  const known = MIGRATIONS.at(-1)!.version;
  if (newest > known) {
    throw new RangeError(
      `the store must be of version ${known} or older, got ${newest}: use a newer shiftwork`,
    );
  }
  for (const migration of MIGRATIONS.filter(({ version }) => version > newest)) {
    await db.transaction().execute(async (transaction) => {
      for (const statement of migration.statements(types)) await sql.raw(statement).execute(transaction);
      await sql`insert into migrations_done (version) values (${migration.version})`.execute(transaction);
    });
  }
}
