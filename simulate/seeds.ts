/**
 * A seed for one part of a simulation, so that no part's draws depend on how many another took
 * (mixing step of the 32-bit FNV-1a hash over the bytes of the parts).
 *
 * @param parts whole numbers; each is taken modulo 2^32
 * @returns 0 .. 2^32 − 1
 */
export function seedFor(...parts: readonly number[]): number {
  const offsetBasis = 0x811c9dc5;
  const prime = 0x01000193;
  let hash = offsetBasis;
  for (const part of parts) {
    for (let shift = 0; shift < 32; shift += 8) {
      hash = Math.imul(hash ^ ((part >>> shift) & 0xff), prime);
    }
  }
  return hash >>> 0;
}
