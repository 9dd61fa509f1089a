/** Root mean square of a spectrum over all its pixels. */
export function rootMeanSquare(flux: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < flux.length; i++) sum += flux[i]! * flux[i]!;
  return Math.sqrt(sum / flux.length);
}

/** A spectrum divided by its root mean square. @throws RangeError when it is zero everywhere */
export function toUnitRms(flux: Float32Array): Float32Array {
  const scale = rootMeanSquare(flux);
  if (!(scale > 0)) throw new RangeError(`a spectrum must have a positive rms, got ${scale}`);
  return flux.map((value) => value / scale);
}

/** A spectrum divided by its largest absolute value. @throws RangeError when it is zero everywhere */
export function toUnitPeak(flux: Float32Array): Float32Array {
  let peak = 0;
  for (const value of flux) peak = Math.max(peak, Math.abs(value));
  if (!(peak > 0)) throw new RangeError(`a spectrum must have a positive peak, got ${peak}`);
  return flux.map((value) => value / peak);
}
