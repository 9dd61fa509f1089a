import { powerOfTwoFor } from './correlate.ts';
import { fftOfSize } from './fft.ts';

/**
 * Takes structure finer than a limit out of a series: the transform is multiplied by a factor that falls from 1
 * to 0 as half a cosine between two periods.
 *
 * @param values any length, padded with zeros
 * @param keptPeriod structure of this period (samples) and longer passes whole
 * @param lostPeriod structure of this period and shorter is removed; < keptPeriod
 */
export function lowPass(values: Float64Array, keptPeriod: number, lostPeriod: number): Float64Array {
  const fft = fftOfSize(powerOfTwoFor(values.length + Math.ceil(keptPeriod)));
  const { size } = fft;
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  re.set(values);
  fft.forward(re, im);
  const places = bitReversed(size);
  for (let k = 0; k < size; k++) {
    const frequency = Math.min(k, size - k) / size;
    const place = (frequency - 1 / keptPeriod) / (1 / lostPeriod - 1 / keptPeriod);
    const factor = 0.5 * (1 + Math.cos(Math.PI * Math.min(1, Math.max(0, place))));
    const at = places[k]!;
    re[at] = (re[at]! * factor) / size;
    im[at] = (im[at]! * factor) / size;
  }
  fft.inverse(re, im);
  return re.subarray(0, values.length);
}

const tables = new Map<number, Uint32Array>();

/** Place of each frequency in the order `Fft.forward` leaves. */
function bitReversed(size: number): Uint32Array {
  const known = tables.get(size);
  if (known !== undefined) return known;
  const table = new Uint32Array(size);
  for (let half = 1; half < size; half *= 2) {
    // rev(k + half) = rev(k) + size / (2 half) for k < half.
    for (let k = 0; k < half; k++) table[k + half] = table[k]! + size / (2 * half);
  }
  tables.set(size, table);
  return table;
}
