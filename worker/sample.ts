import { createHash } from 'node:crypto';

/** Share of the unflagged spectra that keep their curves, so that good answers can be looked at too. */
const SAMPLE_SHARE = 0.02;

/**
 * Whether a spectrum belongs to the sample. Decided by its id alone, so every run and every chunk size choose
 * the same ones.
 */
export function inSample(spectrumId: string): boolean {
  const first = createHash('sha256').update(spectrumId).digest().readUInt32BE(0);
  return first < SAMPLE_SHARE * 2 ** 32;
}
