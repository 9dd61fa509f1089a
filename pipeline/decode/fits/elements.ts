/** How one number is stored; always most significant byte first (FITS 4.0, section 5). */
export type Element = 'u8' | 'i16' | 'i32' | 'i64' | 'f32' | 'f64';

export const ELEMENT_BYTES: Readonly<Record<Element, number>> = {
  u8: 1,
  i16: 2,
  i32: 4,
  i64: 8,
  f32: 4,
  f64: 8,
};

/** physical = zero + scale · stored; `blank` is the stored integer that means missing. */
export interface Scaling {
  readonly scale: number;
  /** bigint when it is beyond 2^53, as for unsigned 64-bit integers. */
  readonly zero: number | bigint;
  readonly blank: number | bigint | null;
}

export const UNSCALED: Scaling = { scale: 1, zero: 0, blank: null };

/**
 * Stored numbers as physical values; missing integers become NaN, as do stored NaN. Integers keep every bit up to
 * 2^53 and are rounded once beyond.
 *
 * @param bytes at least `count` elements
 */
export function decodeNumbers(
  bytes: Uint8Array,
  element: Element,
  count: number,
  scaling: Scaling,
): Float64Array {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length);
  const out = new Float64Array(count);
  // A blank stored value outside the element's range never matches, as it should.
  const blank = scaling.blank === null ? null : Number(scaling.blank);
  switch (element) {
    case 'u8':
      for (let i = 0; i < count; i++) out[i] = bytes[i]!;
      break;
    case 'i16':
      for (let i = 0; i < count; i++) out[i] = view.getInt16(2 * i);
      break;
    case 'i32':
      for (let i = 0; i < count; i++) out[i] = view.getInt32(4 * i);
      break;
    case 'i64':
      decodeLong(view, count, scaling, out);
      return out;
    case 'f32':
      for (let i = 0; i < count; i++) out[i] = view.getFloat32(4 * i);
      break;
    case 'f64':
      for (let i = 0; i < count; i++) out[i] = view.getFloat64(8 * i);
      break;
  }
  const isInteger = element !== 'f32' && element !== 'f64';
  if (isInteger && blank !== null) {
    for (let i = 0; i < count; i++) if (out[i] === blank) out[i] = NaN;
  }
  const { scale } = scaling;
  const zero = Number(scaling.zero);
  if (scale !== 1 || zero !== 0) {
    for (let i = 0; i < count; i++) out[i] = zero + scale * out[i]!;
  }
  return out;
}

/** 64-bit integers: the offset of the unsigned convention is added before the one rounding to a double. */
function decodeLong(view: DataView, count: number, scaling: Scaling, out: Float64Array): void {
  const blank = scaling.blank === null ? null : BigInt(scaling.blank);
  const offset = integerOffset(scaling);
  for (let i = 0; i < count; i++) {
    const stored = view.getBigInt64(8 * i);
    if (stored === blank) out[i] = NaN;
    else if (offset !== null) out[i] = Number(stored + offset);
    else out[i] = Number(scaling.zero) + scaling.scale * Number(stored);
  }
}

/** The offset as an integer when the scaling is a pure integer shift, else null. */
export function integerOffset(scaling: Scaling): bigint | null {
  if (scaling.scale !== 1) return null;
  if (typeof scaling.zero === 'number' && !Number.isInteger(scaling.zero)) return null;
  return BigInt(scaling.zero);
}

/**
 * Stored integers exactly; null where the stored value is the blank one.
 *
 * @param bytes at least `count` elements
 * @param offset added to every stored value
 * @throws TypeError when the element is a float
 */
export function decodeIntegers(
  bytes: Uint8Array,
  element: Element,
  count: number,
  offset: bigint,
  blank: Scaling['blank'],
): (bigint | null)[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length);
  const size = ELEMENT_BYTES[element];
  const missing = blank === null ? null : BigInt(blank);
  return Array.from({ length: count }, (_, i) => {
    const stored = storedInteger(view, element, i * size);
    return stored === missing ? null : stored + offset;
  });
}

function storedInteger(view: DataView, element: Element, offset: number): bigint {
  switch (element) {
    case 'u8':
      return BigInt(view.getUint8(offset));
    case 'i16':
      return BigInt(view.getInt16(offset));
    case 'i32':
      return BigInt(view.getInt32(offset));
    case 'i64':
      return view.getBigInt64(offset);
    case 'f32':
    case 'f64':
      throw new TypeError(`element must be an integer type, got ${element}`);
  }
}
