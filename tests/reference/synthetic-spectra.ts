import { seededRandom } from '../../pipeline/core/random.ts';
import { DEFAULT_STEP } from '../../pipeline/grid/grid-options.ts';
import type { Arm, Spectrum } from '../../pipeline/decode/spectrum.ts';
import type { Family, Kind } from '../../templates/family.ts';

/** Start of the synthetic families' grids: a whole multiple of the step, near 3,000 Å. */
export const FAMILY_FIRST_STEP = Math.round(Math.log(3000) / DEFAULT_STEP);

/** A family whose rows are smooth random spectra with lines, built from a seed. */
export function syntheticFamily(
  seed: number,
  kind: Kind,
  shape: { rows: number; length: number; redshiftMin: number; redshiftMax: number; firstStep?: number },
): Family {
  const random = seededRandom(seed);
  const firstStep = shape.firstStep ?? FAMILY_FIRST_STEP;
  const basis = Array.from({ length: shape.rows }, () => randomRow(random, shape.length));
  return {
    name: `synthetic-${kind}-${seed}`,
    kind,
    grid: { lnStart: firstStep * DEFAULT_STEP, step: DEFAULT_STEP, length: shape.length },
    componentGrid: { lnStart: firstStep * DEFAULT_STEP, step: DEFAULT_STEP, length: shape.length },
    basis,
    redshiftMin: shape.redshiftMin,
    redshiftMax: shape.redshiftMax,
    refitSet: `synthetic-${kind}-${seed}`,
    componentsAt: () => [],
    multiplicativeOrder: 1,
    additiveOrder: -1,
    mismatch: 0.02,
  };
}

/** A sloping continuum with 1 line every 40 pixels, sigma 2 pixels, unit rms. */
function randomRow(random: ReturnType<typeof seededRandom>, length: number): Float32Array {
  const row = new Float64Array(length);
  const slope = random.normal();
  for (let i = 0; i < length; i++) row[i] = 1 + (0.3 * slope * i) / length;
  for (let line = 0; line < length / 40; line++) {
    const centre = random.uniform() * length;
    const depth = -0.3 * random.uniform();
    for (let i = Math.max(0, Math.floor(centre) - 10); i < Math.min(length, centre + 10); i++) {
      row[i] = row[i]! + depth * Math.exp(-0.5 * ((i - centre) / 2) ** 2);
    }
  }
  const rms = Math.sqrt(row.reduce((sum, v) => sum + v * v, 0) / length);
  return Float32Array.from(row, (v) => v / rms);
}

/** A spectrum made of arms, nothing else known. */
export function spectrumOf(
  arms: readonly Partial<Arm>[],
  appliedCorrectionKmS: number | null = null,
): Spectrum {
  return {
    inputHdu: 0,
    inputRow: null,
    arms: arms.map((arm) => ({
      name: '',
      noiseSource: 'stated',
      wavelengthVacuumAngstrom: new Float64Array(0),
      flux: new Float64Array(0),
      inverseVariance: new Float64Array(0),
      ...arm,
    })),
    frame: appliedCorrectionKmS === null ? 'topocentric' : 'barycentric',
    appliedCorrectionKmS,
    observedAt: null,
    exposureS: null,
    coaddedOverNights: false,
    site: null,
    raDeg: null,
    decDeg: null,
    targetName: null,
    field: null,
    exposureId: null,
    fibre: null,
    role: 'target',
    targetClass: null,
    magnitude: null,
    magnitudeBand: null,
    notes: [],
  };
}

/** One arm on the families' pixels: the family's first row moved by whole lags, plus noise. */
export function armFromFamily(
  family: Family,
  firstStep: number,
  length: number,
  lag: number,
  sigma: number,
  seed: number,
): Partial<Arm> {
  const random = seededRandom(seed);
  const row = family.basis[0]!;
  const wavelength = Float64Array.from({ length }, (_, i) => Math.exp((firstStep + i) * family.grid.step));
  const flux = Float64Array.from({ length }, (_, i) => (row[i + lag] ?? 1) + sigma * random.normal());
  return {
    wavelengthVacuumAngstrom: wavelength,
    flux,
    inverseVariance: new Float64Array(length).fill(1 / sigma ** 2),
  };
}
