import type { OrdinalRange, PendingSpectrum } from '../store/index.ts';
import type { ChunkPayload } from './job-payloads.ts';

/** A chunk should keep a thread busy about this long: long enough that the queue costs nothing beside it. */
const AIM_MS = 5_000;
/** Before anything was measured here, a cautious guess. */
const FIRST_GUESS_MS_PER_SPECTRUM = 300;
/** No chunk holds more, so that a lost chunk never costs much. */
const LARGEST_CHUNK = 240;
/** Each thread should get several chunks of a night, else the last one keeps everybody waiting. */
const CHUNKS_PER_THREAD = 4;

/**
 * Spectra per chunk.
 *
 * @param msPerSpectrum measured earlier on this workspace; null when nothing was
 * @returns 1 .. 240
 */
export function chunkSize(spectra: number, threads: number, msPerSpectrum: number | null): number {
  const bySpeed = Math.round(AIM_MS / Math.max(1, msPerSpectrum ?? FIRST_GUESS_MS_PER_SPECTRUM));
  const byShare = Math.ceil(spectra / (threads * CHUNKS_PER_THREAD));
  return Math.max(1, Math.min(LARGEST_CHUNK, bySpeed, byShare));
}

/**
 * Cuts what is pending into chunks: never over the border of an exposure (a chunk has one noise context),
 * runs of ordinals kept together so that a file is read forward.
 *
 * @param size spectra per chunk, >= 1
 */
export function planChunks(
  pending: readonly PendingSpectrum[],
  size: number,
): Pick<ChunkPayload, 'exposureKey' | 'ranges'>[] {
  const byExposure = new Map<string | null, PendingSpectrum[]>();
  for (const spectrum of pending) {
    const group = byExposure.get(spectrum.exposureKey) ?? [];
    group.push(spectrum);
    byExposure.set(spectrum.exposureKey, group);
  }
  const chunks: Pick<ChunkPayload, 'exposureKey' | 'ranges'>[] = [];
  for (const [exposureKey, group] of byExposure) {
    group.sort((a, b) => (a.inputId === b.inputId ? a.ordinal - b.ordinal : a.inputId < b.inputId ? -1 : 1));
    for (let first = 0; first < group.length; first += size) {
      chunks.push({ exposureKey, ranges: rangesOf(group.slice(first, first + size)) });
    }
  }
  return chunks;
}

/** Joins neighbouring ordinals of one input. `spectra` must be sorted by input and ordinal. */
export function rangesOf(spectra: readonly { inputId: string; ordinal: number }[]): OrdinalRange[] {
  const ranges: { inputId: string; first: number; count: number }[] = [];
  for (const { inputId, ordinal } of spectra) {
    const last = ranges.at(-1);
    if (last?.inputId === inputId && last.first + last.count === ordinal) last.count++;
    else ranges.push({ inputId, first: ordinal, count: 1 });
  }
  return ranges;
}
