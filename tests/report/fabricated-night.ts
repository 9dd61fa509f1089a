import type { CandidateSummary, Curves, Reason, ReasonWord } from '../../pipeline/weigh/answer.ts';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import type { NightFacts, NightReader, SpectrumDetail } from '../../store/night-reader.ts';
import type { Kind } from '../../templates/family.ts';

/** Texts that break writers which trust their input. */
export const HOSTILE_TEXTS = [
  '<script>window.broken = true</script>',
  '"><img src=x onerror="window.broken = true">',
  '</script><script>window.broken = true</script>',
  'comma, "quote" and\nline break',
  '# not a comment',
  ' blanks around ',
  'Größe Ω ☆ 星 😀',
  'left \u202e thgir',
  ']]> & &amp; --> <!--',
  'control \u0001 \u007f tab\there',
  'half \ud800 pair',
  "it's \\u0041 back\\slash",
  'long '.repeat(2_000),
] as const;

/** Deterministic noise in [0, 1): a 32-bit linear congruential generator (Numerical Recipes' quick one, from memory). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
}

/** A row that carries nothing but what no row can lack. */
export function emptyRow(id: string): CatalogueRow {
  return {
    spectrum_id: id,
    target_name: null,
    ra: null,
    dec: null,
    field: null,
    exposure_id: null,
    fibre: null,
    role: 'target',
    target_class: null,
    observed_at: null,
    exposure_s: null,
    magnitude: null,
    magnitude_band: null,
    kind: null,
    family: null,
    redshift: null,
    redshift_error: null,
    velocity_km_s: null,
    velocity_error_km_s: null,
    confidence: null,
    confidence_without_prior: null,
    probability_galaxy: null,
    probability_quasar: null,
    probability_star: null,
    probability_none: null,
    needs_review: true,
    reasons: 'unreadable',
    runner_up_redshift: null,
    runner_up_kind: null,
    runner_up_confidence: null,
    correlation_peak: null,
    correlation_r: null,
    chi_square: null,
    degrees_of_freedom: null,
    chi_square_margin: null,
    signal_to_noise_per_angstrom: null,
    good_fraction: null,
    noise_factor: null,
    noise_correlation: null,
    lines_detected: null,
    strongest_line_snr: null,
    frame_as_read: null,
    barycentric_correction_km_s: null,
    barycentric_source: null,
    settled_redshift: null,
    settled_kind: null,
    settled_by: 'program',
    verdict: null,
    verdict_redshift: null,
    verdict_kind: null,
    verdict_certainty: null,
    verdict_by: null,
    verdict_at: null,
    verdict_remark: null,
    input_file: 'night/exposure-1.fits',
    input_hdu: null,
    input_row: null,
    input_sha256: null,
    recipe_hash: 'a'.repeat(64),
    run_id: 'run-1',
    calibration_id: null,
  };
}

/** A row with an answer: every third is flagged, every seventh is a sky fibre. */
export function measuredRow(index: number, random: () => number): CatalogueRow {
  const kind: Kind = (['galaxy', 'quasar', 'star'] as const)[index % 3]!;
  const redshift = {
    galaxy: 0.02 + 0.7 * random(),
    quasar: 0.4 + 3 * random(),
    star: (random() - 0.5) * 0.002,
  }[kind];
  const role = index % 7 === 6 ? 'sky' : 'target';
  const flagged = index % 4 === 1 && role === 'target';
  const reasons: ReasonWord[] = flagged
    ? [(['rival', 'faint', 'lone-line'] as const)[index % 3]!, 'wrong-noise']
    : [];
  return {
    ...emptyRow(`night-1/exposure-1#1.${String(index).padStart(4, '0')}`),
    target_name: `LF ${1000 + index}`,
    ra: 180 + random(),
    dec: -30 - random(),
    field: 'north',
    exposure_id: 'exposure-1',
    fibre: index,
    role,
    target_class: ['bright galaxies', 'quasar candidates', 'halo stars'][index % 3]!,
    observed_at: '2031-04-03T01:02:03.5Z',
    exposure_s: 1800,
    magnitude: 17 + 4 * random(),
    magnitude_band: 'r',
    kind: role === 'sky' ? null : kind,
    family: role === 'sky' ? null : `${kind}-1`,
    redshift: role === 'sky' ? null : redshift,
    redshift_error: role === 'sky' ? null : 0.0001 * (1 + random()),
    velocity_km_s: kind === 'star' && role !== 'sky' ? redshift * 299_792.458 : null,
    velocity_error_km_s: kind === 'star' && role !== 'sky' ? 8 * random() : null,
    confidence: role === 'sky' ? null : flagged ? 0.2 + 0.6 * random() : 0.9 + 0.1 * random(),
    confidence_without_prior: 0.9 * random(),
    probability_galaxy: 0.25,
    probability_quasar: 0.25,
    probability_star: 0.25,
    probability_none: 0.25,
    needs_review: flagged,
    reasons: reasons.join(' '),
    runner_up_redshift: flagged ? redshift + 0.13 : null,
    runner_up_kind: flagged ? 'galaxy' : null,
    runner_up_confidence: flagged ? 0.1 : null,
    correlation_peak: random(),
    correlation_r: 3 + random(),
    chi_square: 4000 + 500 * random(),
    degrees_of_freedom: 4321,
    chi_square_margin: 12.3,
    signal_to_noise_per_angstrom: 20 * random() * random(),
    good_fraction: 0.97,
    noise_factor: 1.05,
    noise_correlation: 0.02,
    lines_detected: 2,
    strongest_line_snr: 7.1,
    frame_as_read: 'topocentric',
    barycentric_correction_km_s: 12.345,
    barycentric_source: 'applied-here',
    settled_redshift: flagged ? null : redshift,
    settled_kind: flagged ? null : kind,
    input_hdu: 1,
    input_row: index,
    input_sha256: 'b'.repeat(64),
    calibration_id: 'calibration-1',
  };
}

/** Two arms with a step between them, noise, an emission line, a masked stretch and a cosmic ray. */
export function fabricatedCurves(seed: number, redshift: number): Curves {
  const random = seeded(seed);
  const arm = (
    name: string,
    from: number,
    to: number,
    pixels: number,
    level: number,
  ): Curves['arms'][number] => {
    const wavelength = Float32Array.from(
      { length: pixels },
      (_, i) => from + ((to - from) * i) / (pixels - 1),
    );
    const shape = (z: number): Float32Array =>
      wavelength.map((value) => {
        const line = (rest: number, height: number, width: number): number =>
          height * Math.exp(-0.5 * ((value - rest * (1 + z)) / width) ** 2);
        return (
          level * (1 + 0.0001 * (value - from)) +
          line(5008.24, 5, 5) +
          line(4960.3, 1.7, 5) +
          line(4862.7, 1.8, 6) +
          line(3728.5, 3, 6) -
          line(3934.8, 1.2, 9) -
          line(3969.6, 1.2, 9)
        );
      });
    const model = shape(redshift);
    const error = model.map((value) => 0.12 + 0.03 * Math.abs(value));
    const flux = model.map(
      (value, i) => value + error[i]! * 3.46 * (random() + random() + random() - 1.5) * 0.58,
    );
    const used = new Uint8Array(pixels).fill(1);
    used.fill(0, Math.floor(pixels * 0.7), Math.floor(pixels * 0.71));
    used[Math.floor(pixels / 2)] = 0;
    flux[Math.floor(pixels / 2)] = 5_000;
    flux[3] = NaN;
    return {
      name,
      wavelengthVacuumAngstrom: wavelength,
      flux,
      error,
      used,
      model,
      runnerUpModel: shape(redshift + 0.13),
    };
  };
  const scan = (kind: Kind, from: number, to: number, pixels: number): Curves['scan'][number] => {
    const z = Float32Array.from({ length: pixels }, (_, i) => from + ((to - from) * i) / (pixels - 1));
    return {
      kind,
      redshift: z,
      chiSquare: z.map(
        (value) =>
          4600 -
          500 * Math.exp(-0.5 * ((value - redshift) / 0.004) ** 2) -
          430 * Math.exp(-0.5 * ((value - redshift - 0.13) / 0.004) ** 2) +
          30 * random(),
      ),
    };
  };
  return {
    arms: [arm('blue', 3650, 5900, 2250, 3), arm('red', 5700, 9650, 3900, 2.6)],
    scan: [
      scan('galaxy', -0.002, 1.5, 3000),
      scan('quasar', 0.05, 4, 1500),
      scan('star', -0.005, 0.005, 300),
    ],
  };
}

/** What a page shows of a flagged row. */
export function fabricatedDetail(row: CatalogueRow): SpectrumDetail {
  const reasons: Reason[] = row.reasons
    .split(' ')
    .filter((word) => word !== '')
    .map((word) => ({
      word: word as ReasonWord,
      weight: 'look',
      sentence: `z = ${row.runner_up_redshift?.toFixed(5) ?? 'none'} fits nearly as well: chi-square is only 12.3 higher.`,
      numbers: { margin: 12.3 },
    }));
  if (row.redshift === null || row.kind === null) return { reasons, candidates: [], lines: [], curves: null };
  const candidate = (redshift: number, chiSquare: number, probability: number): CandidateSummary => ({
    kind: row.kind!,
    family: row.family ?? '',
    redshift,
    redshiftError: 0.0001,
    chiSquare,
    degreesOfFreedom: 4321,
    probability,
    correlationPeak: 0.5,
    correlationR: 4,
  });
  return {
    reasons,
    candidates: [candidate(row.redshift, 4100, 0.6), candidate(row.redshift + 0.13, 4112.3, 0.3)],
    lines: [
      {
        name: '[O III] 5008',
        wavelengthRestVacuumAngstrom: 5008.24,
        wavelengthObservedAngstrom: 5008.24 * (1 + row.redshift),
        flux: 12,
        fluxError: 2,
        equivalentWidthAngstrom: 5.5,
        signalToNoise: 6,
      },
    ],
    curves: fabricatedCurves(row.fibre ?? 1, row.redshift),
  };
}

/** A reader over given rows. */
export function readerOf(rows: readonly CatalogueRow[], facts: Partial<NightFacts> = {}): NightReader {
  const byId = new Map(rows.map((row) => [row.spectrum_id, row]));
  return {
    facts: () => ({
      name: '2031-04-02',
      recipeHash: 'a'.repeat(64),
      runId: 'run-1',
      expected: rows.length,
      measured: rows.length,
      startedAt: '2031-04-03T10:00:00Z',
      finishedAt: '2031-04-03T10:04:05Z',
      stageMs: { read: 0.8, grid: 3.1, match: 41.5, measure: 88.2, weigh: 0.6 },
      provenance: {
        program: '0.1.0',
        config_sha256: 'c'.repeat(64),
        templates: { 'galaxy-1': 'd'.repeat(64) },
        inputs: { 'night/exposure-1.fits': 'b'.repeat(64) },
      },
      ...facts,
    }),
    rows: () => rows,
    detail: (id) => fabricatedDetail(byId.get(id)!),
  };
}

/** About thirty rows: ordinary ones, one where everything is missing, and one per hostile text. */
export function fabricatedRows(): readonly CatalogueRow[] {
  const random = seeded(2031);
  const ordinary = Array.from({ length: 24 }, (_, index) => measuredRow(index, random));
  const hostile = HOSTILE_TEXTS.map(
    (text, i): CatalogueRow => ({
      ...measuredRow(101 + 4 * i, random),
      role: 'target',
      target_name: text,
      target_class: text,
      field: text,
      magnitude_band: text,
      verdict: 'agree',
      verdict_by: text,
      verdict_remark: text,
      input_file: `night/${text}.fits`,
    }),
  );
  return [...ordinary, emptyRow('night-1/broken#0'), ...hostile].sort((a, b) =>
    a.spectrum_id < b.spectrum_id ? -1 : 1,
  );
}
