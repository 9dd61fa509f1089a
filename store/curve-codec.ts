import { deflateRawSync, inflateRawSync } from 'node:zlib';
import type { CurveArm, Curves } from '../pipeline/weigh/answer.ts';
import type { Kind } from '../templates/family.ts';
import { packSeries, unpackSeries } from './series-codec.ts';

/** Rule of the store: the curves of one spectrum take at most this much. */
export const MAX_PACKED_BYTES = 30_000;

/** Flux is kept to an eighth of the typical error: finer steps would only store noise. */
const FLUX_STEPS_PER_ERROR = 8;
/** A model is smooth, so finer steps cost little, and a plot shows them. */
const MODEL_STEPS_PER_ERROR = 32;
/** Relative step of errors; a plot cannot show 2 per cent of an error bar. */
const ERROR_STEP_LN = 0.02;
/** A tenth of the narrowest pixel in use anywhere near. */
const WAVELENGTH_STEP_ANGSTROM = 0.02;
/** In chi-square; differences below 0.1 mean nothing. */
const CHI_SQUARE_STEP = 0.1;
const REDSHIFT_STEP = 2e-6;

interface Packed {
  readonly arms: readonly (Record<Channel, number> & { name: string; pixels: number })[];
  readonly scan: readonly { kind: Kind; points: number; redshift: number; chiSquare: number }[];
}
type Channel = 'wavelength' | 'flux' | 'error' | 'model' | 'runnerUpModel';

/**
 * Quantises and deflates what a page needs to draw one spectrum. Coarsens the steps, then the pixels, until
 * the result fits MAX_PACKED_BYTES.
 *
 * @param curves not-finite values are kept as NaN
 * @returns bytes for unpackCurves
 */
export function packCurves(curves: Curves): Uint8Array {
  let thinned = curves;
  for (let coarseness = 1; ; coarseness *= 2) {
    const packed = packWith(thinned, coarseness);
    if (packed.length <= MAX_PACKED_BYTES) return packed;
    // Past half an error per step the noise itself shows steps: give up pixels instead.
    if (coarseness >= FLUX_STEPS_PER_ERROR / 2) {
      thinned = everySecond(thinned);
      coarseness = 1;
    }
  }
}

function packWith(curves: Curves, coarseness: number): Uint8Array {
  const chunks: Uint8Array[] = [];
  const arms = curves.arms.map((arm) => {
    const error = typicalError(arm);
    const steps: Record<Channel, number> = {
      wavelength: WAVELENGTH_STEP_ANGSTROM,
      flux: (error / FLUX_STEPS_PER_ERROR) * coarseness,
      error: ERROR_STEP_LN * coarseness,
      model: (error / MODEL_STEPS_PER_ERROR) * coarseness,
      runnerUpModel: (error / MODEL_STEPS_PER_ERROR) * coarseness,
    };
    chunks.push(
      packSeries(arm.wavelengthVacuumAngstrom, steps.wavelength, 2),
      packSeries(arm.flux, steps.flux, 0),
      packSeries(arm.error.map(logOrNaN), steps.error, 1),
      packSeries(arm.model, steps.model, 2),
      packSeries(arm.runnerUpModel, steps.runnerUpModel, 2),
      arm.used,
    );
    return { name: arm.name, pixels: arm.flux.length, ...steps };
  });
  const scan = curves.scan.map(({ kind, redshift, chiSquare }) => {
    const steps = { redshift: REDSHIFT_STEP, chiSquare: CHI_SQUARE_STEP * coarseness };
    chunks.push(packSeries(redshift, steps.redshift, 2), packSeries(chiSquare, steps.chiSquare, 1));
    return { kind, points: redshift.length, ...steps };
  });
  const head = new TextEncoder().encode(JSON.stringify({ arms, scan } satisfies Packed));
  const length = new Uint8Array(4);
  new DataView(length.buffer).setUint32(0, head.length, true);
  return deflateRawSync(Buffer.concat([length, head, ...chunks]), { level: 9 });
}

/**
 * The inverse of packCurves, to within half a step of each channel.
 *
 * @throws Error when the bytes were not made by packCurves
 */
export function unpackCurves(packed: Uint8Array): Curves {
  const bytes = new Uint8Array(inflateRawSync(packed));
  const view = new DataView(bytes.buffer);
  let offset = 4 + view.getUint32(0, true);
  const head = JSON.parse(new TextDecoder().decode(bytes.subarray(4, offset))) as Packed;
  const series = (step: number, order: 0 | 1 | 2) => {
    const { values, end } = unpackSeries(bytes, offset, step, order);
    offset = end;
    return values;
  };
  const arms = head.arms.map((arm): CurveArm => {
    const wavelengthVacuumAngstrom = series(arm.wavelength, 2);
    const flux = series(arm.flux, 0);
    const error = series(arm.error, 1).map(Math.exp);
    const model = series(arm.model, 2);
    const runnerUpModel = series(arm.runnerUpModel, 2);
    const used = bytes.slice(offset, offset + arm.pixels);
    offset += arm.pixels;
    return { name: arm.name, wavelengthVacuumAngstrom, flux, error, used, model, runnerUpModel };
  });
  const scan = head.scan.map(({ kind, redshift, chiSquare }) => ({
    kind,
    redshift: series(redshift, 2),
    chiSquare: series(chiSquare, 1),
  }));
  return { arms, scan };
}

/** Median finite error of the used pixels; 1 when there is none, so that steps stay positive. */
function typicalError(arm: CurveArm): number {
  const usable = arm.error.filter((error, i) => arm.used[i] === 1 && error > 0 && Number.isFinite(error));
  const median = usable.sort()[usable.length >> 1];
  return median ?? 1;
}

function logOrNaN(error: number): number {
  return error > 0 ? Math.log(error) : Number.NaN;
}

function everySecond(curves: Curves): Curves {
  const half = <T extends Float32Array | Uint8Array>(values: T) => values.filter((_, i) => i % 2 === 0) as T;
  return {
    arms: curves.arms.map((arm) => ({
      name: arm.name,
      wavelengthVacuumAngstrom: half(arm.wavelengthVacuumAngstrom),
      flux: half(arm.flux),
      error: half(arm.error),
      used: half(arm.used),
      model: half(arm.model),
      runnerUpModel: half(arm.runnerUpModel),
    })),
    scan: curves.scan.map(({ kind, redshift, chiSquare }) => ({
      kind,
      redshift: half(redshift),
      chiSquare: half(chiSquare),
    })),
  };
}
