import type { Arm } from '../decode/index.ts';
import type { GridArm } from '../grid/index.ts';
import type { KindCurve } from '../match/index.ts';
import type { Refit, RefitPixels } from '../measure/index.ts';
import type { CurveArm, Curves } from './answer.ts';

/**
 * What a page draws of one spectrum: data, errors, best model and runner-up on the native pixels.
 *
 * @param arms as read
 * @param gridArms the arms that gave `pixels` its ranges, in the same order
 */
export function curvesOf(
  arms: readonly Arm[],
  gridArms: readonly GridArm[],
  pixels: RefitPixels,
  best: Refit | null,
  runnerUp: Refit | null,
  scan: readonly KindCurve[],
): Curves {
  return {
    arms: gridArms.map(({ armIndex }, a) => curveArm(arms[armIndex]!, pixels, a, best, runnerUp)),
    scan: scan.map(({ kind, redshift, chiSquare }) => ({
      kind,
      redshift: Float32Array.from(redshift),
      chiSquare: Float32Array.from(chiSquare),
    })),
  };
}

function curveArm(
  arm: Arm,
  pixels: RefitPixels,
  armIndex: number,
  best: Refit | null,
  runnerUp: Refit | null,
): CurveArm {
  const n = arm.flux.length;
  const used = new Uint8Array(n);
  const model = new Float32Array(n).fill(NaN);
  const runnerUpModel = runnerUp ? new Float32Array(n).fill(NaN) : new Float32Array(0);
  const range = pixels.arms[armIndex];
  if (range) {
    for (let k = range.first; k < range.end; k++) {
      const i = pixels.nativeIndex[k]!;
      used[i] = 1;
      if (best) model[i] = best.model[k]! * pixels.fluxScale;
      if (runnerUp) runnerUpModel[i] = runnerUp.model[k]! * pixels.fluxScale;
    }
  }
  return {
    name: arm.name,
    wavelengthVacuumAngstrom: Float32Array.from(arm.wavelengthVacuumAngstrom),
    flux: Float32Array.from(arm.flux),
    error: Float32Array.from(arm.inverseVariance, (w) => (w > 0 ? 1 / Math.sqrt(w) : 0)),
    used,
    model,
    runnerUpModel,
  };
}
