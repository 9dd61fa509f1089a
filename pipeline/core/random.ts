/** A stream of random numbers that is the same on every machine for the same seed. */
export interface RandomStream {
  /** Uniform in [0, 1), 53 random bits. */
  uniform(): number;
  /** Standard normal deviate. */
  normal(): number;
  /** Whole number, uniform in 0 .. n − 1. */
  integer(n: number): number;
}

const GOLDEN = 0x9e3779b9;

/**
 * The generator xoshiro128** 1.1 (Blackman & Vigna 2021), its state filled from the seed by a 32-bit mixer
 * (Appleby's MurmurHash3 finaliser over a Weyl sequence) so that neighbouring seeds give unrelated streams.
 *
 * @param seed whole number; taken modulo 2^32
 */
export function seededRandom(seed: number): RandomStream {
  let weyl = seed >>> 0;
  const fill = (): number => {
    weyl = (weyl + GOLDEN) >>> 0;
    let h = weyl;
    h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
    h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
    return (h ^ (h >>> 16)) >>> 0;
  };
  const next = xoshiro128StarStar([fill(), fill(), fill(), fill()]);
  let spare: number | null = null;
  // 27 + 26 bits make the 53 of a double.
  const uniform = (): number => ((next() >>> 5) * 2 ** 26 + (next() >>> 6)) / 2 ** 53;
  return {
    uniform,
    normal() {
      if (spare !== null) {
        const value = spare;
        spare = null;
        return value;
      }
      // Polar method (Marsaglia & Bray 1964): two deviates per accepted point.
      for (;;) {
        const u = 2 * uniform() - 1;
        const v = 2 * uniform() - 1;
        const s = u * u + v * v;
        if (s >= 1 || s === 0) continue;
        const factor = Math.sqrt((-2 * Math.log(s)) / s);
        spare = v * factor;
        return u * factor;
      }
    },
    integer: (n) => Math.floor(uniform() * n),
  };
}

/**
 * The bare generator: successive 32-bit outputs (Blackman & Vigna 2021, ACM TOMS 47, 36).
 *
 * @param state four 32-bit words, not all zero
 */
export function xoshiro128StarStar(state: readonly [number, number, number, number]): () => number {
  let [a, b, c, d] = state;
  const rotate = (x: number, k: number): number => (x << k) | (x >>> (32 - k));
  return () => {
    const result = Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotate(d, 11);
    return result;
  };
}
