import type { CardSpec } from './hdu-spec.ts';

/** Bytes of one FITS block (FITS 4.0, section 3.1). */
export const BLOCK_BYTES = 2880;

/** What an HDU consists of before its header is laid out. */
export interface HduParts {
  /** XTENSION; an IMAGE may also stand as the primary HDU. */
  readonly extension: 'IMAGE' | 'BINTABLE';
  /** The mandatory cards after SIMPLE or XTENSION, then those that describe the data. */
  readonly structure: readonly CardSpec[];
  /** Padded to whole blocks. */
  readonly data: Uint8Array<ArrayBuffer>;
}

/** Zero bytes, as many as `length` padded to whole blocks. */
export function zeroPadded(length: number): Uint8Array<ArrayBuffer> {
  return new Uint8Array(Math.ceil(length / BLOCK_BYTES) * BLOCK_BYTES);
}
