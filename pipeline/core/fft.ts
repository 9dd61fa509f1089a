/**
 * A complex Fourier transform of one size, in place on separate real and imaginary arrays.
 *
 * The forward transform leaves its output in bit-reversed order and the inverse takes it in that order: a
 * correlation never looks at single frequencies, so the reordering pass is left out.
 */
export interface Fft {
  /** Number of complex samples, a power of two >= 2. */
  readonly size: number;
  /** X[k] = Σ x[n] exp(−2πi k n / size), in place; X[k] ends at position bit-reverse(k). */
  forward(re: Float64Array, im: Float64Array): void;
  /** size × x[n] = Σ X[k] exp(+2πi k n / size), in place, from bit-reversed order; not divided by size. */
  inverse(re: Float64Array, im: Float64Array): void;
}

/** Twiddle factors of one radix-4 pass over blocks of 4 × quarter samples: w^k, w^2k, w^3k for k < quarter. */
interface Pass {
  readonly quarter: number;
  readonly c1: Float64Array;
  readonly s1: Float64Array;
  readonly c2: Float64Array;
  readonly s2: Float64Array;
  readonly c3: Float64Array;
  readonly s3: Float64Array;
}

const plans = new Map<number, Fft>();

/**
 * The transform of a given size; its tables are computed once and kept.
 *
 * @param size power of two, 2 .. 2^24
 * @throws RangeError for any other size
 */
export function fftOfSize(size: number): Fft {
  const known = plans.get(size);
  if (known) return known;
  if (!Number.isInteger(size) || size < 2 || size > 2 ** 24 || (size & (size - 1)) !== 0) {
    throw new RangeError(`fftOfSize() size must be a power of two from 2 to 2^24, got ${size}`);
  }
  const plan = makePlan(size);
  plans.set(size, plan);
  return plan;
}

function makePlan(size: number): Fft {
  const passes: Pass[] = [];
  let block = size;
  for (; block > 4; block /= 4) passes.push(makePass(block));
  const lastForward = block === 4 ? forwardFour : pairPass;
  const firstInverse = block === 4 ? inverseFour : pairPass;
  return {
    size,
    forward(re, im) {
      for (const pass of passes) forwardPass(pass, size, re, im);
      lastForward(size, re, im);
    },
    inverse(re, im) {
      firstInverse(size, re, im);
      for (let p = passes.length - 1; p >= 0; p--) inversePass(passes[p]!, size, re, im);
    },
  };
}

function makePass(block: number): Pass {
  const quarter = block / 4;
  const table = (multiple: number, of: (angle: number) => number): Float64Array =>
    Float64Array.from({ length: quarter }, (_, k) => of((2 * Math.PI * multiple * k) / block));
  return {
    quarter,
    c1: table(1, Math.cos),
    s1: table(1, Math.sin),
    c2: table(2, Math.cos),
    s2: table(2, Math.sin),
    c3: table(3, Math.cos),
    s3: table(3, Math.sin),
  };
}

/** Two fused radix-2 decimation-in-frequency steps (Gentleman & Sande 1966): output stays bit-reversed. */
function forwardPass(pass: Pass, size: number, re: Float64Array, im: Float64Array): void {
  const { quarter, c1, s1, c2, s2, c3, s3 } = pass;
  for (let start = 0; start < size; start += 4 * quarter) {
    for (let k = 0; k < quarter; k++) {
      const i0 = start + k;
      const i1 = i0 + quarter;
      const i2 = i1 + quarter;
      const i3 = i2 + quarter;
      const evenRe = re[i0]! + re[i2]!;
      const evenIm = im[i0]! + im[i2]!;
      const evenDiffRe = re[i0]! - re[i2]!;
      const evenDiffIm = im[i0]! - im[i2]!;
      const oddRe = re[i1]! + re[i3]!;
      const oddIm = im[i1]! + im[i3]!;
      const oddDiffRe = re[i1]! - re[i3]!;
      const oddDiffIm = im[i1]! - im[i3]!;
      re[i0] = evenRe + oddRe;
      im[i0] = evenIm + oddIm;
      const r1 = evenRe - oddRe;
      const m1 = evenIm - oddIm;
      re[i1] = r1 * c2[k]! + m1 * s2[k]!;
      im[i1] = m1 * c2[k]! - r1 * s2[k]!;
      const r2 = evenDiffRe + oddDiffIm;
      const m2 = evenDiffIm - oddDiffRe;
      re[i2] = r2 * c1[k]! + m2 * s1[k]!;
      im[i2] = m2 * c1[k]! - r2 * s1[k]!;
      const r3 = evenDiffRe - oddDiffIm;
      const m3 = evenDiffIm + oddDiffRe;
      re[i3] = r3 * c3[k]! + m3 * s3[k]!;
      im[i3] = m3 * c3[k]! - r3 * s3[k]!;
    }
  }
}

/** The mirror image of forwardPass: two fused decimation-in-time steps (Cooley & Tukey 1965). */
function inversePass(pass: Pass, size: number, re: Float64Array, im: Float64Array): void {
  const { quarter, c1, s1, c2, s2, c3, s3 } = pass;
  for (let start = 0; start < size; start += 4 * quarter) {
    for (let k = 0; k < quarter; k++) {
      const i0 = start + k;
      const i1 = i0 + quarter;
      const i2 = i1 + quarter;
      const i3 = i2 + quarter;
      const aRe = re[i1]! * c2[k]! - im[i1]! * s2[k]!;
      const aIm = im[i1]! * c2[k]! + re[i1]! * s2[k]!;
      const bRe = re[i2]! * c1[k]! - im[i2]! * s1[k]!;
      const bIm = im[i2]! * c1[k]! + re[i2]! * s1[k]!;
      const cRe = re[i3]! * c3[k]! - im[i3]! * s3[k]!;
      const cIm = im[i3]! * c3[k]! + re[i3]! * s3[k]!;
      const sumRe = re[i0]! + aRe;
      const sumIm = im[i0]! + aIm;
      const diffRe = re[i0]! - aRe;
      const diffIm = im[i0]! - aIm;
      const plusRe = bRe + cRe;
      const plusIm = bIm + cIm;
      const minusRe = bRe - cRe;
      const minusIm = bIm - cIm;
      re[i0] = sumRe + plusRe;
      im[i0] = sumIm + plusIm;
      re[i2] = sumRe - plusRe;
      im[i2] = sumIm - plusIm;
      re[i1] = diffRe - minusIm;
      im[i1] = diffIm + minusRe;
      re[i3] = diffRe + minusIm;
      im[i3] = diffIm - minusRe;
    }
  }
}

/** The last forward pass when log2(size) is even: blocks of four, all twiddle factors 1. */
function forwardFour(size: number, re: Float64Array, im: Float64Array): void {
  for (let i = 0; i < size; i += 4) {
    const evenRe = re[i]! + re[i + 2]!;
    const evenIm = im[i]! + im[i + 2]!;
    const evenDiffRe = re[i]! - re[i + 2]!;
    const evenDiffIm = im[i]! - im[i + 2]!;
    const oddRe = re[i + 1]! + re[i + 3]!;
    const oddIm = im[i + 1]! + im[i + 3]!;
    const oddDiffRe = re[i + 1]! - re[i + 3]!;
    const oddDiffIm = im[i + 1]! - im[i + 3]!;
    re[i] = evenRe + oddRe;
    im[i] = evenIm + oddIm;
    re[i + 1] = evenRe - oddRe;
    im[i + 1] = evenIm - oddIm;
    re[i + 2] = evenDiffRe + oddDiffIm;
    im[i + 2] = evenDiffIm - oddDiffRe;
    re[i + 3] = evenDiffRe - oddDiffIm;
    im[i + 3] = evenDiffIm + oddDiffRe;
  }
}

/** The first inverse pass when log2(size) is even. */
function inverseFour(size: number, re: Float64Array, im: Float64Array): void {
  for (let i = 0; i < size; i += 4) {
    const sumRe = re[i]! + re[i + 1]!;
    const sumIm = im[i]! + im[i + 1]!;
    const diffRe = re[i]! - re[i + 1]!;
    const diffIm = im[i]! - im[i + 1]!;
    const plusRe = re[i + 2]! + re[i + 3]!;
    const plusIm = im[i + 2]! + im[i + 3]!;
    const minusRe = re[i + 2]! - re[i + 3]!;
    const minusIm = im[i + 2]! - im[i + 3]!;
    re[i] = sumRe + plusRe;
    im[i] = sumIm + plusIm;
    re[i + 1] = diffRe - minusIm;
    im[i + 1] = diffIm + minusRe;
    re[i + 2] = sumRe - plusRe;
    im[i + 2] = sumIm - plusIm;
    re[i + 3] = diffRe + minusIm;
    im[i + 3] = diffIm - minusRe;
  }
}

/** The radix-2 step on neighbours, its own inverse up to scale; the last step when log2(size) is odd. */
function pairPass(size: number, re: Float64Array, im: Float64Array): void {
  for (let i = 0; i < size; i += 2) {
    const r = re[i]! - re[i + 1]!;
    const m = im[i]! - im[i + 1]!;
    re[i] = re[i]! + re[i + 1]!;
    im[i] = im[i]! + im[i + 1]!;
    re[i + 1] = r;
    im[i + 1] = m;
  }
}
