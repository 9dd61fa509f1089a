/** Random access to the bytes of one input, synchronous so that it can be used inside a thread. */
export interface ByteSource {
  /** What messages call this input, e.g. a relative path. */
  readonly label: string;
  /** Total length in bytes. */
  readonly size: number;
  /** Exactly `length` bytes from `offset`; shorter only when the source ends first. */
  read(offset: number, length: number): Uint8Array;
}

/** A byte source over bytes already in memory. */
export function bytesInMemory(label: string, bytes: Uint8Array): ByteSource {
  return {
    label,
    size: bytes.length,
    read: (offset, length) => bytes.subarray(offset, Math.min(offset + length, bytes.length)),
  };
}
