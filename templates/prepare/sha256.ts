/** First 32 bits of the fractional parts of the cube roots of the first 64 primes (FIPS 180-4, 4.2.2). */
const ROUND_CONSTANTS = fractionalRoots(64, 3);
/** The same of the square roots of the first 8 primes (FIPS 180-4, 5.3.3). */
const INITIAL_STATE = fractionalRoots(8, 2);

/**
 * SHA-256 of bytes (FIPS 180-4), as 64 lower-case hexadecimal digits. Here because a pure folder may not reach
 * the machine's own; about 100 MB/s.
 */
export function sha256(bytes: Uint8Array): string {
  const state = Uint32Array.from(INITIAL_STATE);
  const schedule = new Uint32Array(64);
  const whole = bytes.length - (bytes.length % 64);
  for (let at = 0; at < whole; at += 64) compress(state, schedule, bytes, at);
  const tail = new Uint8Array(bytes.length - whole < 56 ? 64 : 128);
  tail.set(bytes.subarray(whole));
  tail[bytes.length - whole] = 0x80;
  const view = new DataView(tail.buffer);
  view.setBigUint64(tail.length - 8, BigInt(bytes.length) * 8n);
  for (let at = 0; at < tail.length; at += 64) compress(state, schedule, tail, at);
  return Array.from(state, (word) => word.toString(16).padStart(8, '0')).join('');
}

/** One 64-byte block (FIPS 180-4, 6.2.2). */
function compress(state: Uint32Array, w: Uint32Array, bytes: Uint8Array, at: number): void {
  for (let t = 0; t < 16; t++) {
    const k = at + 4 * t;
    w[t] = (bytes[k]! << 24) | (bytes[k + 1]! << 16) | (bytes[k + 2]! << 8) | bytes[k + 3]!;
  }
  for (let t = 16; t < 64; t++) {
    const x = w[t - 15]!;
    const y = w[t - 2]!;
    const small0 = rotate(x, 7) ^ rotate(x, 18) ^ (x >>> 3);
    const small1 = rotate(y, 17) ^ rotate(y, 19) ^ (y >>> 10);
    w[t] = w[t - 16]! + small0 + w[t - 7]! + small1;
  }
  let [a, b, c, d, e, f, g, h] = state as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  for (let t = 0; t < 64; t++) {
    const big1 = rotate(e, 6) ^ rotate(e, 11) ^ rotate(e, 25);
    const choice = (e & f) ^ (~e & g);
    const first = (h + big1 + choice + ROUND_CONSTANTS[t]! + w[t]!) | 0;
    const big0 = rotate(a, 2) ^ rotate(a, 13) ^ rotate(a, 22);
    const majority = (a & b) ^ (a & c) ^ (b & c);
    h = g;
    g = f;
    f = e;
    e = (d + first) | 0;
    d = c;
    c = b;
    b = a;
    a = (first + big0 + majority) | 0;
  }
  [a, b, c, d, e, f, g, h].forEach((value, i) => {
    state[i]! += value;
  });
}

const rotate = (x: number, n: number): number => (x >>> n) | (x << (32 - n));

/** First 32 bits of the fractional parts of the square (2) or cube (3) roots of the first primes, exactly. */
function fractionalRoots(count: number, degree: 2 | 3): Uint32Array {
  const roots: number[] = [];
  for (let candidate = 2; roots.length < count; candidate++) {
    let isPrime = true;
    for (let d = 2; d * d <= candidate; d++) if (candidate % d === 0) isPrime = false;
    if (isPrime)
      roots.push(Number(wholeRoot(BigInt(candidate) << BigInt(32 * degree), degree) & 0xffffffffn));
  }
  return Uint32Array.from(roots);
}

/** ⌊n^(1/degree)⌋ by bisection in integers: a double has too few bits for the last digit. */
function wholeRoot(n: bigint, degree: 2 | 3): bigint {
  let low = 0n;
  let high = 1n << 40n;
  while (high - low > 1n) {
    const middle = (low + high) >> 1n;
    if (middle ** BigInt(degree) <= n) low = middle;
    else high = middle;
  }
  return low;
}
