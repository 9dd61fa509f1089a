import type { ArmPayload, SeriesRange, SpectrumPayload } from '../spectrum/payload.ts';

/** Curves ready to draw; null = missing. */
export interface Arm {
  readonly payload: ArmPayload;
  readonly wavelength: number[];
  readonly flux: (number | null)[];
  readonly error: (number | null)[];
  readonly model: (number | null)[];
  readonly runnerUp: (number | null)[] | null;
}

export interface Scan {
  readonly kind: string;
  readonly redshift: number[];
  readonly chiSquare: (number | null)[];
}

export interface Unpacked {
  readonly payload: SpectrumPayload;
  readonly arms: readonly Arm[];
  readonly scan: readonly Scan[];
}

const MISSING_CODE = 0xffff;

/** Reads what spectrum/pack.ts wrote. */
export async function unpack(payload: SpectrumPayload): Promise<Unpacked> {
  const bytes = await inflate(payload.samples);
  let at = 0;
  const next = (length: number, range: SeriesRange): (number | null)[] => {
    const values = readSeries(bytes.subarray(at, at + 2 * length), length, range);
    at += 2 * length;
    return values;
  };
  const arms = payload.arms.map((arm) => ({
    payload: arm,
    wavelength: next(arm.length, arm.wavelength).map(Number),
    flux: next(arm.length, arm.flux),
    error: next(arm.length, arm.error),
    model: next(arm.length, arm.model),
    runnerUp: arm.runnerUp === null ? null : next(arm.length, arm.runnerUp),
  }));
  const scan = payload.scan.map((one) => ({
    kind: one.kind,
    redshift: next(one.length, one.redshift).map(Number),
    chiSquare: next(one.length, one.chiSquare),
  }));
  return { payload, arms, scan };
}

function readSeries(bytes: Uint8Array, length: number, range: SeriesRange): (number | null)[] {
  const values: (number | null)[] = [];
  let code = 0;
  for (let i = 0; i < length; i++) {
    code = (code + ((bytes[i]! << 8) | bytes[length + i]!)) & 0xffff;
    values.push(code === MISSING_CODE ? null : range.from + (code / range.levels) * (range.to - range.from));
  }
  return values;
}

async function inflate(base64: string): Promise<Uint8Array> {
  const packed = Uint8Array.from(atob(base64), (character) => character.charCodeAt(0));
  const stream = new Blob([packed]).stream().pipeThrough(new DecompressionStream('deflate-raw'));
  return new Uint8Array(await new Response(stream).arrayBuffer());
}
