/**
 * A bit set over more than this share of the pixels that carry weight is a remark, no defect: what is broken gets no
 * weight. On real co-adds bits over 18 to 47 % of the pixels show 0.7 to 1.1 of the scatter of the other pixels;
 * bits that mark defects stay below 10 %.
 */
const REMARK_SHARE = 0.15;

/** Which pixels the masks leave, and what a person may want to know about how they were read. */
export interface CombinedMasks {
  /** 1 = unusable. */
  readonly bad: Uint8Array;
  readonly notes: readonly string[];
}

/**
 * Join the masks of one spectrum.
 *
 * Where one mask's pixels all lie inside another's, the narrow one is what is bad in every exposure and the wide one
 * what was bad in any: the narrow one counts (the wide one covers 40-60 % of sound pixels in real co-adds). Bits set
 * over a good part of the spectrum are remarks about it and are ignored.
 *
 * @param masks whole numbers, one array per mask, equal lengths
 * @param badWhen which values are bad
 * @param hasWeight 1 = the pixel carries weight, same length
 */
export function combineMasks(
  masks: readonly Float64Array[],
  badWhen: 'nonzero' | 'zero',
  hasWeight: Uint8Array,
): CombinedMasks {
  const notes: string[] = [];
  const touched = masks.map((mask) =>
    Uint8Array.from(mask, (value) => ((value === 0) === (badWhen === 'zero') ? 1 : 0)),
  );
  const bad = new Uint8Array(hasWeight.length);
  masks.forEach((mask, k) => {
    if (touched.some((other, j) => j !== k && isWiderThan(touched[k]!, other))) {
      notes.push(`mask ${k + 1} of ${masks.length} contains another and was not used`);
      return;
    }
    const flagged = badWhen === 'zero' ? touched[k]! : flaggedPixels(mask, hasWeight, notes);
    for (let i = 0; i < bad.length; i += 1) if (flagged[i] !== 0) bad[i] = 1;
  });
  return { bad, notes };
}

/** Whether `mask` flags all that `other` flags, and more. */
function isWiderThan(mask: Uint8Array, other: Uint8Array): boolean {
  let more = 0;
  for (let i = 0; i < mask.length; i += 1) {
    if (mask[i]! < other[i]!) return false;
    more += mask[i]! - other[i]!;
  }
  return more > 0;
}

function flaggedPixels(mask: Float64Array, hasWeight: Uint8Array, notes: string[]): Uint8Array {
  let weighty = 0;
  const setCount = new Float64Array(53);
  const bits = mask.map((value) => (Number.isFinite(value) ? Math.abs(Math.trunc(value)) : 0));
  bits.forEach((value, i) => {
    if (hasWeight[i] === 0) return;
    weighty += 1;
    for (let bit = 0, rest = value; rest > 0 && bit < 53; bit += 1, rest = Math.floor(rest / 2)) {
      if (rest % 2 === 1) setCount[bit]! += 1;
    }
  });
  // A mask of zeros and ones is a plain flag: it says what it says, however much it covers.
  if (bits.every((value) => value <= 1)) return Uint8Array.from(bits);
  let ignored = 0;
  setCount.forEach((count, bit) => {
    if (weighty === 0 || count <= REMARK_SHARE * weighty) return;
    ignored += 2 ** bit;
    notes.push(
      `mask bit ${bit} is set over ${Math.round((100 * count) / weighty)} % of the pixels and was ignored`,
    );
  });
  // Values beyond 32 bits are kept exact by BigInt; masks are small, so this costs little.
  const ignoredBits = BigInt(ignored);
  return Uint8Array.from(bits, (value) =>
    value !== 0 && (ignored === 0 || (BigInt(value) & ~ignoredBits) !== 0n) ? 1 : 0,
  );
}
