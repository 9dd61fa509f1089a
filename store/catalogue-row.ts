import type { Kind } from '../templates/family.ts';

/**
 * One spectrum of a night as published: every column of the catalogue, in catalogue order. Missing = null.
 * Column names, units and UCDs are described once, in report/catalogue/columns.ts.
 */
export interface CatalogueRow {
  readonly spectrum_id: string;
  readonly target_name: string | null;
  readonly ra: number | null;
  readonly dec: number | null;
  readonly field: string | null;
  readonly exposure_id: string | null;
  readonly fibre: number | null;
  readonly role: string;
  readonly target_class: string | null;
  readonly observed_at: string | null;
  readonly exposure_s: number | null;
  readonly magnitude: number | null;
  readonly magnitude_band: string | null;
  readonly kind: Kind | null;
  readonly family: string | null;
  readonly redshift: number | null;
  readonly redshift_error: number | null;
  readonly velocity_km_s: number | null;
  readonly velocity_error_km_s: number | null;
  readonly confidence: number | null;
  readonly confidence_without_prior: number | null;
  readonly probability_galaxy: number | null;
  readonly probability_quasar: number | null;
  readonly probability_star: number | null;
  readonly probability_none: number | null;
  readonly needs_review: boolean;
  /** Space-separated reason words, empty when none. */
  readonly reasons: string;
  readonly runner_up_redshift: number | null;
  readonly runner_up_kind: Kind | null;
  readonly runner_up_confidence: number | null;
  readonly correlation_peak: number | null;
  readonly correlation_r: number | null;
  readonly chi_square: number | null;
  readonly degrees_of_freedom: number | null;
  readonly chi_square_margin: number | null;
  readonly signal_to_noise_per_angstrom: number | null;
  readonly good_fraction: number | null;
  readonly noise_factor: number | null;
  readonly noise_correlation: number | null;
  readonly lines_detected: number | null;
  readonly strongest_line_snr: number | null;
  readonly frame_as_read: string | null;
  readonly barycentric_correction_km_s: number | null;
  readonly barycentric_source: string | null;
  readonly settled_redshift: number | null;
  readonly settled_kind: Kind | null;
  readonly settled_by: string;
  readonly verdict: string | null;
  readonly verdict_redshift: number | null;
  readonly verdict_kind: Kind | null;
  readonly verdict_certainty: string | null;
  readonly verdict_by: string | null;
  readonly verdict_at: string | null;
  readonly verdict_remark: string | null;
  readonly input_file: string;
  readonly input_hdu: number | null;
  readonly input_row: number | null;
  readonly input_sha256: string | null;
  readonly recipe_hash: string;
  readonly run_id: string;
  readonly calibration_id: string | null;
}
