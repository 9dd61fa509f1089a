/** Root mean square of a spectrum over all its pixels. */
export function rootMeanSquare(flux: Float32Array): number {
  let sum = 0;
  for (let i = 0; i < flux.length; i++) sum += flux[i]! * flux[i]!;
  return Math.sqrt(sum / flux.length);
}

/** A spectrum divided by its root mean square. @throws RangeError when it is zero everywhere */
export function toUnitRms(flux: Float32Array): Float32Array {
  const scale = rootMeanSquare(flux);
  if (!(scale > 0)) throw new RangeError(`a spectrum must have a positive rms, got ${scale}`);
  return divided(flux, scale);
}

/** A spectrum divided by its largest absolute value. @throws RangeError when it is zero everywhere */
export function toUnitPeak(flux: Float32Array): Float32Array {
  let peak = 0;
  for (let i = 0; i < flux.length; i++) peak = Math.max(peak, Math.abs(flux[i]!));
  if (!(peak > 0)) throw new RangeError(`a spectrum must have a positive peak, got ${peak}`);
  return divided(flux, peak);
}

function divided(flux: Float32Array, by: number): Float32Array {
  const result = new Float32Array(flux.length);
  for (let i = 0; i < flux.length; i++) result[i] = flux[i]! / by;
  return result;
}
