import type { Kysely } from 'kysely';
import type { CandidateSummary, LineMeasurement, Reason } from '../pipeline/weigh/answer.ts';
import type { Kind } from '../templates/family.ts';
import { byCodeUnit } from './by-code-unit.ts';
import type { CatalogueRow } from './catalogue-row.ts';
import type { VerdictWord } from './contract.ts';
import { unpackCurves } from './curve-codec.ts';
import type { SpectrumDetail } from './night-reader.ts';
import { candidateOf } from './outcome-rows.ts';
import type { Database, VerdictTable } from './schema.ts';
import { settle } from './settle.ts';

/** What a reader of a finished night sees. */

/** Measurements of the night under its current recipe, beside their spectrum and input. */
function currentRows(db: Kysely<Database>, night: string) {
  return db
    .selectFrom('spectra')
    .innerJoin('nights', 'nights.name', 'spectra.night')
    .innerJoin('inputs', 'inputs.id', 'spectra.input_id')
    .innerJoin('measurements', (join) =>
      join
        .onRef('measurements.spectrum_id', '=', 'spectra.spectrum_id')
        .onRef('measurements.recipe_hash', '=', 'nights.current_recipe'),
    )
    .where('spectra.night', '=', night);
}

/** See Store.rows. */
export async function catalogueRows(db: Kysely<Database>, night: string): Promise<readonly CatalogueRow[]> {
  const rows = await currentRows(db, night)
    .selectAll('spectra')
    .selectAll('measurements')
    .select('inputs.relative_path')
    .execute();
  const added = await nightReasons(db, night);
  const verdicts = await lastVerdicts(db, night);
  return rows
    .map((row): CatalogueRow => {
      const ownReasons = JSON.parse(row.reasons_json) as Reason[];
      const reasons = [...ownReasons, ...(added.get(row.spectrum_id) ?? [])];
      const needsReview = row.needs_review === 1 || reasons.some(({ weight }) => weight !== 'note');
      const verdict = verdicts.get(row.spectrum_id);
      const settled = settle({
        kind: row.kind as Kind | null,
        redshift: row.redshift,
        needsReview,
        verdict: (verdict?.verdict ?? null) as VerdictWord | null,
        verdictKind: (verdict?.kind ?? null) as Kind | null,
        verdictRedshift: verdict?.redshift ?? null,
      });
      return {
        spectrum_id: row.spectrum_id,
        target_name: row.target_name,
        ra: row.ra,
        dec: row.dec,
        field: row.field,
        exposure_id: row.exposure_id,
        fibre: row.fibre,
        role: row.role,
        target_class: row.target_class,
        observed_at: row.observed_at,
        exposure_s: row.exposure_s,
        magnitude: row.magnitude,
        magnitude_band: row.magnitude_band,
        kind: row.kind as Kind | null,
        family: row.family,
        redshift: row.redshift,
        redshift_error: row.redshift_error,
        velocity_km_s: row.velocity_km_s,
        velocity_error_km_s: row.velocity_error_km_s,
        confidence: row.confidence,
        confidence_without_prior: row.confidence_without_prior,
        probability_galaxy: row.probability_galaxy,
        probability_quasar: row.probability_quasar,
        probability_star: row.probability_star,
        probability_none: row.probability_none,
        needs_review: needsReview,
        reasons: reasons.map(({ word }) => word).join(' '),
        runner_up_redshift: row.runner_up_redshift,
        runner_up_kind: row.runner_up_kind as Kind | null,
        runner_up_confidence: row.runner_up_confidence,
        correlation_peak: row.correlation_peak,
        correlation_r: row.correlation_r,
        chi_square: row.chi_square,
        degrees_of_freedom: row.degrees_of_freedom,
        chi_square_margin: row.chi_square_margin,
        signal_to_noise_per_angstrom: row.signal_to_noise_per_angstrom,
        good_fraction: row.good_fraction,
        noise_factor: row.noise_factor,
        noise_correlation: row.noise_correlation,
        lines_detected: row.lines_detected,
        strongest_line_snr: row.strongest_line_snr,
        frame_as_read: row.frame_as_read,
        barycentric_correction_km_s: row.barycentric_correction_km_s,
        barycentric_source: row.barycentric_source,
        settled_redshift: settled.redshift,
        settled_kind: settled.kind,
        settled_by: settled.by,
        verdict: verdict?.verdict ?? null,
        verdict_redshift: verdict?.redshift ?? null,
        verdict_kind: (verdict?.kind ?? null) as Kind | null,
        verdict_certainty: verdict?.certainty ?? null,
        verdict_by: verdict?.reviewer ?? null,
        verdict_at: verdict?.at ?? null,
        verdict_remark: verdict?.remark ?? null,
        input_file: row.relative_path,
        input_hdu: row.hdu,
        input_row: row.row,
        input_sha256: row.input_sha256,
        recipe_hash: row.recipe_hash,
        run_id: row.run_id,
        calibration_id: row.calibration_id,
      };
    })
    .sort(byCodeUnit((row) => row.spectrum_id));
}

/** Reasons of the night job by spectrum, in code-unit order of their word. */
async function nightReasons(db: Kysely<Database>, night: string): Promise<Map<string, Reason[]>> {
  const rows = await db
    .selectFrom('night_reasons')
    .innerJoin('nights', (join) =>
      join
        .onRef('nights.name', '=', 'night_reasons.night')
        .onRef('nights.current_recipe', '=', 'night_reasons.recipe_hash'),
    )
    .selectAll('night_reasons')
    .where('night', '=', night)
    .execute();
  const bySpectrum = new Map<string, Reason[]>();
  for (const row of rows.sort(byCodeUnit(({ word }) => word))) {
    const reasons = bySpectrum.get(row.spectrum_id) ?? [];
    reasons.push(JSON.parse(row.reason_json) as Reason);
    bySpectrum.set(row.spectrum_id, reasons);
  }
  return bySpectrum;
}

async function lastVerdicts(db: Kysely<Database>, night: string): Promise<Map<string, VerdictTable>> {
  const rows = await db
    .selectFrom('verdicts')
    .innerJoin('spectra', 'spectra.spectrum_id', 'verdicts.spectrum_id')
    .selectAll('verdicts')
    .where('spectra.night', '=', night)
    .orderBy('sequence')
    .execute();
  return new Map(rows.map((row) => [row.spectrum_id, row]));
}

/** See Store.details. */
export async function spectrumDetails(
  db: Kysely<Database>,
  night: string,
): Promise<ReadonlyMap<string, () => SpectrumDetail>> {
  const rows = await currentRows(db, night)
    .leftJoin('curves', (join) =>
      join
        .onRef('curves.spectrum_id', '=', 'measurements.spectrum_id')
        .onRef('curves.recipe_hash', '=', 'measurements.recipe_hash'),
    )
    .select(['spectra.spectrum_id', 'reasons_json', 'lines_json', 'packed'])
    .execute();
  const candidates = await currentRows(db, night)
    .innerJoin('candidates', (join) =>
      join
        .onRef('candidates.spectrum_id', '=', 'measurements.spectrum_id')
        .onRef('candidates.recipe_hash', '=', 'measurements.recipe_hash'),
    )
    .selectAll('candidates')
    .orderBy('place')
    .execute();
  const added = await nightReasons(db, night);
  const bySpectrum = new Map<string, CandidateSummary[]>();
  for (const candidate of candidates) {
    const summaries = bySpectrum.get(candidate.spectrum_id) ?? [];
    summaries.push(candidateOf(candidate));
    bySpectrum.set(candidate.spectrum_id, summaries);
  }
  return new Map(
    rows.map((row) => [
      row.spectrum_id,
      (): SpectrumDetail => ({
        reasons: [...(JSON.parse(row.reasons_json) as Reason[]), ...(added.get(row.spectrum_id) ?? [])],
        candidates: bySpectrum.get(row.spectrum_id) ?? [],
        lines: JSON.parse(row.lines_json) as LineMeasurement[],
        curves: row.packed === null ? null : unpackCurves(row.packed),
      }),
    ]),
  );
}
