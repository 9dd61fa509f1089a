/** Largest whole number of steps kept; beyond it a value is as good as infinite for a plot. */
const MAX_STEPS = 2 ** 28;

/** How often neighbours are subtracted before packing: 0 for noise, 1 for slopes, 2 for smooth curves. */
export type DifferenceOrder = 0 | 1 | 2;

/**
 * Turns a series into few, small whole numbers that deflate well: quantise, subtract neighbours `order`
 * times, fold the sign into the lowest bit, and write the bytes of equal weight together.
 *
 * @param step quantum, > 0; values come back within half of it
 * @returns count (4 bytes), a bit per value for NaN when there is any, then four byte planes (high planes
 *   are zero and deflate to nothing)
 */
export function packSeries(series: Float32Array, step: number, order: DifferenceOrder): Uint8Array {
  const n = series.length;
  const out = new Uint8Array(5 + Math.ceil(n / 8) + 4 * n);
  new DataView(out.buffer).setUint32(0, n, true);
  const whole = new Int32Array(n);
  let missing = 0;
  for (let i = 0; i < n; i++) {
    const value = series[i]!;
    if (Number.isFinite(value)) {
      whole[i] = Math.max(-MAX_STEPS, Math.min(MAX_STEPS, Math.round(value / step)));
    } else {
      whole[i] = i === 0 ? 0 : whole[i - 1]!;
      out[5 + (i >> 3)]! |= 1 << (i & 7);
      missing++;
    }
  }
  out[4] = missing > 0 ? 1 : 0;
  for (let pass = 0; pass < order; pass++) for (let i = n - 1; i > 0; i--) whole[i]! -= whole[i - 1]!;
  const planes = 5 + (missing > 0 ? Math.ceil(n / 8) : 0);
  for (let i = 0; i < n; i++) {
    const folded = (whole[i]! << 1) ^ (whole[i]! >> 31);
    for (let plane = 0; plane < 4; plane++) out[planes + plane * n + i] = (folded >>> (8 * plane)) & 0xff;
  }
  return out.subarray(0, planes + 4 * n);
}

/**
 * The inverse of packSeries.
 *
 * @returns the values and where the series ends in `bytes`
 */
export function unpackSeries(
  bytes: Uint8Array,
  offset: number,
  step: number,
  order: DifferenceOrder,
): { values: Float32Array<ArrayBuffer>; end: number } {
  const n = new DataView(bytes.buffer, bytes.byteOffset).getUint32(offset, true);
  const mask = offset + 5;
  const hasMissing = bytes[offset + 4] === 1;
  const planes = mask + (hasMissing ? Math.ceil(n / 8) : 0);
  const whole = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    let folded = 0;
    for (let plane = 3; plane >= 0; plane--) folded = (folded << 8) | bytes[planes + plane * n + i]!;
    whole[i] = (folded >>> 1) ^ -(folded & 1);
  }
  for (let pass = 0; pass < order; pass++) for (let i = 1; i < n; i++) whole[i]! += whole[i - 1]!;
  const values = new Float32Array(n);
  for (let i = 0; i < n; i++) {
    const isMissing = hasMissing && ((bytes[mask + (i >> 3)]! >> (i & 7)) & 1) === 1;
    values[i] = isMissing ? Number.NaN : whole[i]! * step;
  }
  return { values, end: planes + 4 * n };
}
