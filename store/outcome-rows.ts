import type { Insertable } from 'kysely';
import type { Answer, CandidateSummary, Reason } from '../pipeline/weigh/answer.ts';
import type { Fault, Outcome, SpectrumFacts } from './contract.ts';
import { finiteOrNull, storedJson } from './finite-or-null.ts';
import type { CandidateTable, MeasurementTable, SpectrumTable } from './schema.ts';

/** What a measurement row carries besides the measured. */
interface RowKey {
  readonly recipeHash: string;
  readonly runId: string;
  readonly measuredAt: string;
}

/** The measurement row of one outcome; every number finite or null. */
export function measurementRow(outcome: Outcome, key: RowKey): Insertable<MeasurementTable> {
  const identity = {
    spectrum_id: outcome.spectrumId,
    recipe_hash: key.recipeHash,
    run_id: key.runId,
    measured_at: key.measuredAt,
    input_sha256: outcome.inputSha256,
  };
  return 'answer' in outcome.result
    ? { ...identity, fault_code: null, ...answerColumns(outcome.result.answer) }
    : { ...identity, ...faultColumns(outcome.result.fault) };
}

function answerColumns(answer: Answer) {
  return {
    kind: answer.kind,
    family: answer.family,
    redshift: finiteOrNull(answer.redshift),
    redshift_error: finiteOrNull(answer.redshiftError),
    velocity_km_s: finiteOrNull(answer.velocityKmS),
    velocity_error_km_s: finiteOrNull(answer.velocityErrorKmS),
    confidence: finiteOrNull(answer.confidence),
    confidence_without_prior: finiteOrNull(answer.confidenceWithoutPrior),
    probability_galaxy: finiteOrNull(answer.probabilityGalaxy),
    probability_quasar: finiteOrNull(answer.probabilityQuasar),
    probability_star: finiteOrNull(answer.probabilityStar),
    probability_none: finiteOrNull(answer.probabilityNone),
    needs_review: Number(answer.needsReview),
    reasons_json: storedJson(answer.reasons),
    runner_up_redshift: finiteOrNull(answer.runnerUpRedshift),
    runner_up_kind: answer.runnerUpKind,
    runner_up_confidence: finiteOrNull(answer.runnerUpConfidence),
    correlation_peak: finiteOrNull(answer.correlationPeak),
    correlation_r: finiteOrNull(answer.correlationR),
    chi_square: finiteOrNull(answer.chiSquare),
    degrees_of_freedom: finiteOrNull(answer.degreesOfFreedom),
    chi_square_margin: finiteOrNull(answer.chiSquareMargin),
    signal_to_noise_per_angstrom: finiteOrNull(answer.signalToNoisePerAngstrom),
    good_fraction: finiteOrNull(answer.goodFraction),
    noise_factor: finiteOrNull(answer.noiseFactor),
    noise_correlation: finiteOrNull(answer.noiseCorrelation),
    lines_detected: finiteOrNull(answer.linesDetected),
    strongest_line_snr: finiteOrNull(answer.strongestLineSnr),
    barycentric_correction_km_s: finiteOrNull(answer.barycentricCorrectionKmS),
    barycentric_source: answer.barycentricSource,
    calibration_id: answer.calibrationId,
    lines_json: storedJson(answer.lines),
    features_json: storedJson(answer.features),
  };
}

function faultColumns(fault: Fault) {
  const reason: Reason = { word: fault.word, weight: 'blocks', sentence: fault.detail, numbers: {} };
  const missing = Object.fromEntries(
    Object.keys(answerColumns(NO_ANSWER)).map((column) => [column, null]),
  ) as unknown as Insertable<MeasurementTable>;
  return {
    ...missing,
    fault_code: fault.code,
    needs_review: 1,
    reasons_json: storedJson([reason]),
    lines_json: '[]',
    features_json: '{}',
  };
}

/** Only its keys matter: a fault has the columns of an answer, empty. */
const NO_ANSWER: Answer = {
  kind: null,
  family: null,
  redshift: null,
  redshiftError: null,
  velocityKmS: null,
  velocityErrorKmS: null,
  confidence: 0,
  confidenceWithoutPrior: 0,
  probabilityGalaxy: 0,
  probabilityQuasar: 0,
  probabilityStar: 0,
  probabilityNone: 1,
  needsReview: true,
  reasons: [],
  runnerUpRedshift: null,
  runnerUpKind: null,
  runnerUpConfidence: null,
  correlationPeak: null,
  correlationR: null,
  chiSquare: null,
  degreesOfFreedom: null,
  chiSquareMargin: null,
  signalToNoisePerAngstrom: null,
  goodFraction: 0,
  noiseFactor: 1,
  noiseCorrelation: 0,
  linesDetected: 0,
  strongestLineSnr: null,
  barycentricCorrectionKmS: null,
  barycentricSource: 'unknown',
  calibrationId: null,
  candidates: [],
  lines: [],
  features: {},
};

/** Candidate rows of one outcome, best first; a candidate without a finite redshift is left out. */
export function candidateRows(outcome: Outcome, recipeHash: string): Insertable<CandidateTable>[] {
  if (!('answer' in outcome.result)) return [];
  return outcome.result.answer.candidates
    .filter((candidate) => Number.isFinite(candidate.redshift))
    .map((candidate, place) => ({
      spectrum_id: outcome.spectrumId,
      recipe_hash: recipeHash,
      place,
      kind: candidate.kind,
      family: candidate.family,
      redshift: candidate.redshift,
      redshift_error: finiteOrNull(candidate.redshiftError),
      chi_square: finiteOrNull(candidate.chiSquare),
      degrees_of_freedom: finiteOrNull(candidate.degreesOfFreedom),
      probability: finiteOrNull(candidate.probability),
      correlation_peak: finiteOrNull(candidate.correlationPeak),
      correlation_r: finiteOrNull(candidate.correlationR),
    }));
}

/** A stored candidate as pages see it; what was not finite comes back as NaN. */
export function candidateOf(row: CandidateTable): CandidateSummary {
  return {
    kind: row.kind as CandidateSummary['kind'],
    family: row.family,
    redshift: row.redshift,
    redshiftError: row.redshift_error,
    chiSquare: row.chi_square ?? Number.NaN,
    degreesOfFreedom: row.degrees_of_freedom ?? Number.NaN,
    probability: row.probability ?? Number.NaN,
    correlationPeak: row.correlation_peak ?? Number.NaN,
    correlationR: row.correlation_r ?? Number.NaN,
  };
}

/** The columns of a spectrum that come from its file. */
export function factColumns(facts: SpectrumFacts): Partial<SpectrumTable> {
  return {
    target_name: facts.targetName,
    ra: finiteOrNull(facts.raDeg),
    dec: finiteOrNull(facts.decDeg),
    field: facts.field,
    exposure_id: facts.exposureId,
    fibre: finiteOrNull(facts.fibre),
    role: facts.role,
    target_class: facts.targetClass,
    observed_at: facts.observedAt,
    exposure_s: finiteOrNull(facts.exposureS),
    magnitude: finiteOrNull(facts.magnitude),
    magnitude_band: facts.magnitudeBand,
    frame_as_read: facts.frame,
  };
}
