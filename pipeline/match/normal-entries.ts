/** Ridge on the normal matrix, relative to its mean diagonal: rows that are nearly the same stay harmless. */
const RIDGE = 1e-9;
/** Rounding of a correlation by Fourier transforms, relative to its largest value, times 10^3. */
const ROUNDING = 1e-12;
/** Lags worked on together: their entries of one elimination step stay in the nearest cache. */
const BLOCK = 256;

/** The entries of the normal equations, one array over lags each. */
export interface NormalEntries {
  readonly size: number;
  /** Σ w T_j T_k, j >= k, entry j × size + k. The other entries are unused. */
  readonly gram: readonly Float64Array[];
  /** Σ w d T_k. */
  readonly right: readonly Float64Array[];
  /** Σ w q_p T_k, entry p × size + k. */
  readonly nuisance: readonly Float64Array[];
}

/**
 * bᵀ (A + ridge)⁻¹ b at lags first .. end−1: what the family explains, by Gaussian elimination on the lower
 * triangle, a block of lags at a time. Overwrites the entries at these lags.
 *
 * @param floor from `pivotFloor`
 * @param into receives the result at the same places
 */
export function solveExplained(
  entries: NormalEntries,
  first: number,
  end: number,
  floor: number,
  into: Float64Array,
): void {
  const { size, gram, right } = entries;
  const factor = new Float64Array(BLOCK);
  const inverse = new Float64Array(BLOCK);
  for (let from = first; from < end; from += BLOCK) {
    const to = Math.min(from + BLOCK, end);
    addRidge(entries, from, to, floor, factor);
    into.fill(0, from, to);
    for (let p = 0; p < size; p++) {
      const pivot = gram[p * size + p]!;
      const own = right[p]!;
      for (let t = from; t < to; t++) {
        // A family that is empty at these wavelengths has pivot 0 and explains nothing.
        const reciprocal = pivot[t]! > 0 ? 1 / pivot[t]! : 0;
        inverse[t - from] = reciprocal;
        into[t] = into[t]! + own[t]! * own[t]! * reciprocal;
      }
      for (let j = p + 1; j < size; j++) {
        const below = gram[j * size + p]!;
        for (let t = from; t < to; t++) factor[t - from] = below[t]! * inverse[t - from]!;
        subtractProduct(right[j]!, factor, own, from, to);
        for (let k = p + 1; k <= j; k++) {
          subtractProduct(gram[j * size + k]!, factor, gram[k * size + p]!, from, to);
        }
      }
    }
  }
}

/**
 * What rounding leaves in a diagonal entry, times 10^3: where a family is all but empty (a quasar's spectrum
 * below the Lyman limit) its matrix is rounding only, and this ridge keeps it from explaining anything.
 *
 * @param entries before anything is eliminated
 */
export function pivotFloor({ size, gram }: NormalEntries, lags: number): number {
  let largest = 0;
  for (let t = 0; t < lags; t++) {
    let trace = 0;
    for (let j = 0; j < size; j++) trace += gram[j * size + j]![t]!;
    largest = Math.max(largest, trace);
  }
  return (ROUNDING * largest) / size;
}

function addRidge(
  { size, gram }: NormalEntries,
  from: number,
  to: number,
  floor: number,
  trace: Float64Array,
): void {
  trace.fill(0);
  for (let j = 0; j < size; j++) {
    const diagonal = gram[j * size + j]!;
    for (let t = from; t < to; t++) trace[t - from] = trace[t - from]! + diagonal[t]!;
  }
  for (let j = 0; j < size; j++) {
    const diagonal = gram[j * size + j]!;
    for (let t = from; t < to; t++) diagonal[t] = diagonal[t]! + (RIDGE / size) * trace[t - from]! + floor;
  }
}

/** target[t] −= factor[t − from] × other[t] for t in from .. to−1. */
function subtractProduct(
  target: Float64Array,
  factor: Float64Array,
  other: Float64Array,
  from: number,
  to: number,
): void {
  for (let t = from; t < to; t++) target[t] = target[t]! - factor[t - from]! * other[t]!;
}

/**
 * Takes polynomials that are orthonormal under w out of the matrix at lags first .. end−1: their Gram matrix is
 * the unit matrix, so the Schur complement is A_jk − Σ_p n_pj n_pk. (The data hold no part of them.)
 */
export function eliminateOrthonormal(entries: NormalEntries, first: number, end: number): void {
  const { size, gram, nuisance } = entries;
  for (let j = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) {
      const target = gram[j * size + k]!;
      for (let p = 0; p < nuisance.length; p += size) {
        const a = nuisance[p + j]!;
        const b = nuisance[p + k]!;
        for (let t = first; t < end; t++) target[t] = target[t]! - a[t]! * b[t]!;
      }
    }
  }
}
