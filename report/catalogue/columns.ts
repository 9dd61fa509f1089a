import type { CatalogueRow } from '../../store/catalogue-row.ts';

/**
 * How a column is stored in every format.
 * `word`: one of our own ASCII words; `text`: anything the input or a person may have written (any Unicode).
 */
export type ColumnType = 'word' | 'text' | 'int' | 'float' | 'double' | 'boolean';

/** What one catalogue column is. The four writers take everything they say about a column from here. */
export interface Column {
  readonly name: keyof CatalogueRow;
  readonly type: ColumnType;
  /** Valid both as a FITS 4.0 TUNIT and as a VOUnits 1.0 string; empty when the column has none. */
  readonly unit: string;
  /** UCD1+ words, most significant first; empty when the controlled vocabulary has none that fits. */
  readonly ucd: string;
  /** One sentence for a user of the catalogue, ASCII. */
  readonly meaning: string;
  /** Decimals worth showing a person. Files always carry the full value. */
  readonly decimals?: number;
  /** ISO 8601 UTC moments. */
  readonly isTime?: true;
}

type Facts = Omit<Column, 'name'>;

const word = (ucd: string, meaning: string): Facts => ({ type: 'word', unit: '', ucd, meaning });
const text = (ucd: string, meaning: string): Facts => ({ type: 'text', unit: '', ucd, meaning });
const time = (ucd: string, meaning: string): Facts => ({
  type: 'word',
  unit: '',
  ucd,
  meaning,
  isTime: true,
});
const int = (ucd: string, meaning: string): Facts => ({ type: 'int', unit: '', ucd, meaning });
const flag = (ucd: string, meaning: string): Facts => ({ type: 'boolean', unit: '', ucd, meaning });
const float = (unit: string, ucd: string, decimals: number, meaning: string): Facts => ({
  type: 'float',
  unit,
  ucd,
  meaning,
  decimals,
});
const double = (unit: string, ucd: string, decimals: number, meaning: string): Facts => ({
  type: 'double',
  unit,
  ucd,
  meaning,
  decimals,
});

/** A record, not a list: the compiler then refuses a missing or an unknown column. Order = catalogue order. */
const FACTS: Readonly<Record<keyof CatalogueRow, Facts>> = {
  spectrum_id: text('meta.id;meta.main', 'Stable id of the spectrum: night, input file, HDU and row'),
  target_name: text('meta.id', 'Name of the target as the input gives it'),
  ra: double('deg', 'pos.eq.ra;meta.main', 6, 'Right ascension (ICRS) as the input gives it'),
  dec: double('deg', 'pos.eq.dec;meta.main', 6, 'Declination (ICRS) as the input gives it'),
  field: text('meta.id', 'Field as the input gives it'),
  exposure_id: text('meta.id', 'Exposure as the input gives it'),
  fibre: int('meta.id', 'Fibre number as the input gives it'),
  role: word('meta.code', 'What the fibre was pointed at: target, sky or calibration'),
  target_class: text('meta.code', 'Target class of the survey as the input gives it'),
  observed_at: time('time.epoch', 'Middle of the exposure, ISO 8601, UTC'),
  exposure_s: double('s', 'time.duration;obs.exposure', 1, 'Exposure time'),
  magnitude: float('mag', 'phot.mag', 2, 'Magnitude as the input gives it'),
  magnitude_band: text('meta.code;instr.bandpass', 'Band of the magnitude'),
  kind: word('src.class', 'What the object is: galaxy, quasar or star'),
  family: word('meta.code', 'Template family that fits best'),
  redshift: double('', 'src.redshift', 5, 'Barycentric redshift'),
  redshift_error: double('', 'stat.error;src.redshift', 6, 'Error of the redshift, 1 sigma'),
  velocity_km_s: double(
    'km/s',
    'spect.dopplerVeloc.opt',
    1,
    'Stars: c times z, the barycentric radial-velocity measure (IAU 2000 Resolution C1)',
  ),
  velocity_error_km_s: double(
    'km/s',
    'stat.error;spect.dopplerVeloc.opt',
    1,
    'Error of the velocity, 1 sigma',
  ),
  confidence: float(
    '',
    'stat.probability',
    3,
    'Calibrated probability that c times the redshift error over 1+z is below 300 (galaxy), 1500 (quasar) or 100 (star) km/s',
  ),
  confidence_without_prior: float(
    '',
    'stat.probability',
    3,
    'Confidence without the prior knowledge of the survey',
  ),
  probability_galaxy: float('', 'stat.probability', 3, 'Probability that the object is a galaxy'),
  probability_quasar: float('', 'stat.probability', 3, 'Probability that the object is a quasar'),
  probability_star: float('', 'stat.probability', 3, 'Probability that the object is a star'),
  probability_none: float('', 'stat.probability', 3, 'Probability that none of the templates is right'),
  needs_review: flag('meta.code.qual', 'True: look before you use it'),
  reasons: word('meta.code.qual', 'Why the fit is flagged: words separated by spaces, empty when none'),
  runner_up_redshift: double('', 'src.redshift', 5, 'Redshift of the best different answer'),
  runner_up_kind: word('src.class', 'Kind of the best different answer'),
  runner_up_confidence: float('', 'stat.probability', 3, 'Probability of the best different answer'),
  correlation_peak: float('', 'stat.correlation', 3, 'Height of the cross-correlation peak'),
  correlation_r: float(
    '',
    'stat.correlation',
    2,
    'Peak height over the noise of the cross-correlation (Tonry and Davis 1979)',
  ),
  chi_square: float('', 'stat.fit.chi2', 1, 'Chi-square of the best model on the native pixels'),
  degrees_of_freedom: int('stat.fit.dof', 'Degrees of freedom of the best model'),
  chi_square_margin: float(
    '',
    'stat.fit.chi2;arith.diff',
    1,
    'Chi-square of the runner-up minus that of the best',
  ),
  signal_to_noise_per_angstrom: float(
    '',
    'stat.snr',
    2,
    'Median signal-to-noise ratio in one angstrom of the observed frame',
  ),
  good_fraction: float('', '', 3, 'Usable pixels over all pixels'),
  noise_factor: float('', 'arith.factor', 2, 'Stated errors times this factor equal the scatter seen'),
  noise_correlation: float('', 'stat.correlation', 2, 'Correlation of the noise of neighbouring pixels'),
  lines_detected: int('meta.number;spect.line', 'Emission lines above 3 sigma at the fitted redshift'),
  strongest_line_snr: float('', 'stat.snr;spect.line', 1, 'Signal-to-noise ratio of the strongest line'),
  frame_as_read: word('meta.code;pos.frame', 'Frame of the wavelengths as the input states it'),
  barycentric_correction_km_s: double(
    'km/s',
    'spect.dopplerVeloc;arith.diff',
    2,
    'Velocity of the observatory towards the target, added to reach the barycentre',
  ),
  barycentric_source: word(
    'meta.code',
    'Who applied the barycentric correction: applied-here, already-applied or unknown',
  ),
  settled_redshift: double(
    '',
    'src.redshift',
    5,
    'The redshift to use: the program answer unless a verdict overrules it; empty when undecided',
  ),
  settled_kind: word('src.class', 'The kind that goes with settled_redshift'),
  settled_by: word('meta.code', 'Who settled it: program, reviewer or disputed'),
  verdict: word('meta.code', 'Last verdict of a person, empty when none'),
  verdict_redshift: double('', 'src.redshift', 5, 'Redshift of the verdict'),
  verdict_kind: word('src.class', 'Kind of the verdict'),
  verdict_certainty: word('meta.code.qual', 'How certain the reviewer was: sure or leaning'),
  verdict_by: text('meta.id', 'Reviewer'),
  verdict_at: time('time.processing', 'Moment of the verdict, ISO 8601, UTC'),
  verdict_remark: text('meta.note', 'Remark of the reviewer'),
  input_file: text('meta.id;meta.file', 'Input file, relative to the path given'),
  input_hdu: int('meta.number', 'HDU of the input file, 0 is the primary'),
  input_row: int('meta.number', 'Row inside the HDU, from 0; empty when the HDU holds one spectrum'),
  input_sha256: word('meta.id', 'SHA-256 of the input file, hexadecimal'),
  recipe_hash: word('meta.id', 'SHA-256 of everything that decides the numbers'),
  run_id: word('meta.id', 'Run that measured the spectrum'),
  calibration_id: word('meta.id', 'Calibration of the confidence'),
};

/** Every catalogue column in catalogue order. */
export const COLUMNS: readonly Column[] = Object.entries(FACTS).map(([name, facts]) => ({
  name: name as keyof CatalogueRow,
  ...facts,
}));
