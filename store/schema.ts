/**
 * The tables as the query builder sees them. Text holds JSON where a column says so; switches are 0 or 1 on
 * every backend; 64-bit identifiers are text.
 */
export interface Database {
  nights: NightTable;
  runs: RunTable;
  inputs: InputTable;
  spectra: SpectrumTable;
  requeued: { spectrum_id: string; asked_at: string };
  exposures: { night: string; exposure_key: string; recipe_hash: string; context_json: string };
  measurements: MeasurementTable;
  candidates: CandidateTable;
  curves: { spectrum_id: string; recipe_hash: string; packed: Uint8Array };
  night_reasons: NightReasonTable;
  targets: TargetTable;
  verdicts: VerdictTable;
}

interface NightTable {
  name: string;
  current_recipe: string | null;
  current_run: string | null;
  settings_json: string;
}

interface RunTable {
  run_id: string;
  night: string;
  recipe_hash: string;
  started_at: string;
  finished_at: string | null;
  stage_ms_json: string;
  spectra_measured: number;
  provenance_json: string;
}

export interface InputTable {
  id: string;
  night: string;
  path: string;
  root: string;
  relative_path: string;
  size_bytes: number;
  modified_ms: number;
  inode: string;
  sha256: string | null;
  layout_json: string | null;
  fault_code: string | null;
  fault_detail: string | null;
  exposure_key: string | null;
}

export interface SpectrumTable {
  spectrum_id: string;
  night: string;
  input_id: string;
  ordinal: number;
  hdu: number | null;
  row: number | null;
  target_name: string | null;
  ra: number | null;
  dec: number | null;
  field: string | null;
  exposure_id: string | null;
  fibre: number | null;
  role: string;
  target_class: string | null;
  observed_at: string | null;
  exposure_s: number | null;
  magnitude: number | null;
  magnitude_band: string | null;
  frame_as_read: string | null;
}

export interface MeasurementTable {
  spectrum_id: string;
  recipe_hash: string;
  run_id: string;
  measured_at: string;
  input_sha256: string | null;
  fault_code: string | null;
  kind: string | null;
  family: string | null;
  redshift: number | null;
  redshift_error: number | null;
  velocity_km_s: number | null;
  velocity_error_km_s: number | null;
  confidence: number | null;
  confidence_without_prior: number | null;
  probability_galaxy: number | null;
  probability_quasar: number | null;
  probability_star: number | null;
  probability_none: number | null;
  needs_review: number;
  reasons_json: string;
  runner_up_redshift: number | null;
  runner_up_kind: string | null;
  runner_up_confidence: number | null;
  correlation_peak: number | null;
  correlation_r: number | null;
  chi_square: number | null;
  degrees_of_freedom: number | null;
  chi_square_margin: number | null;
  signal_to_noise_per_angstrom: number | null;
  good_fraction: number | null;
  noise_factor: number | null;
  noise_correlation: number | null;
  lines_detected: number | null;
  strongest_line_snr: number | null;
  barycentric_correction_km_s: number | null;
  barycentric_source: string | null;
  calibration_id: string | null;
  lines_json: string;
  features_json: string;
}

export interface CandidateTable {
  spectrum_id: string;
  recipe_hash: string;
  /** 0 = the answer. */
  place: number;
  kind: string;
  family: string;
  redshift: number;
  redshift_error: number | null;
  chi_square: number | null;
  degrees_of_freedom: number | null;
  probability: number | null;
  correlation_peak: number | null;
  correlation_r: number | null;
}

interface NightReasonTable {
  night: string;
  recipe_hash: string;
  spectrum_id: string;
  word: string;
  weight: string;
  reason_json: string;
}

interface TargetTable {
  night: string;
  recipe_hash: string;
  target_key: string;
  target_name: string | null;
  ra: number | null;
  dec: number | null;
  spectra: number;
  kind: string | null;
  redshift: number | null;
  clash: number;
}

export interface VerdictTable {
  spectrum_id: string;
  /** 1, 2, 3 ... per spectrum: the order in which people spoke. */
  sequence: number;
  verdict: string;
  redshift: number | null;
  kind: string | null;
  certainty: string;
  reviewer: string;
  at: string;
  remark: string | null;
}
