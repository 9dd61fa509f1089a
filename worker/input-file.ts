import { createHash } from 'node:crypto';
import { closeSync, createReadStream, fstatSync, openSync, readSync, statSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { type ByteSource, bytesInMemory } from '../pipeline/decode/byte-source.ts';
import { DEFAULT_READ_LIMITS, type ReadLimits } from '../pipeline/decode/fits/limits.ts';
import { InputFault } from '../pipeline/errors.ts';

/** How a file is known again: when one of these differs it was changed. */
export interface FileState {
  readonly sizeBytes: number;
  readonly modifiedMs: number;
  /** Text, because it may need 64 bits. */
  readonly inode: string;
}

/** A byte source with a file handle behind it. */
export interface OpenFile {
  readonly source: ByteSource;
  readonly state: FileState;
  close(): void;
}

/** First bytes of a gzip stream (RFC 1952, 2.3.1). */
const GZIP_MAGIC = [0x1f, 0x8b];

/**
 * Opens an input for reading by range; a gzip stream is undone into memory, whatever its name says.
 *
 * @param label what messages and spectrum ids call the file
 * @throws InputFault `file-missing`, `file-empty`, `gzip-broken`, `file-too-large`
 */
export function openFile(path: string, label: string, limits: ReadLimits = DEFAULT_READ_LIMITS): OpenFile {
  let file: number;
  try {
    file = openSync(path, 'r');
  } catch (error) {
    throw missing(label, error);
  }
  try {
    const state = stateOf(file);
    if (state.sizeBytes === 0)
      throw new InputFault('file-empty', { file: label }, 'file must hold bytes, got 0');
    const read = (offset: number, length: number) => readRange(file, label, offset, length);
    const first = read(0, GZIP_MAGIC.length);
    if (GZIP_MAGIC.every((byte, i) => first[i] === byte)) {
      const bytes = undoGzip(read(0, state.sizeBytes), label, limits);
      closeSync(file);
      return { source: bytesInMemory(label, bytes), state, close: () => undefined };
    }
    return {
      source: { label, size: state.sizeBytes, read },
      state,
      close: () => {
        closeSync(file);
      },
    };
  } catch (error) {
    closeQuietly(file);
    throw error;
  }
}

/**
 * Reads a file once from start to end.
 *
 * @returns its sha256 in lower-case hexadecimal, and its state
 * @throws InputFault `file-missing`, `file-changed` when it changed while it was read
 */
export async function hashFile(path: string, label: string): Promise<{ sha256: string; state: FileState }> {
  const before = fileState(path, label);
  const hash = createHash('sha256');
  try {
    for await (const bytes of createReadStream(path, { highWaterMark: 1 << 20 }))
      hash.update(bytes as Buffer);
  } catch (error) {
    throw missing(label, error);
  }
  checkUnchanged(path, label, before);
  return { sha256: hash.digest('hex'), state: before };
}

/** @throws InputFault `file-missing` */
export function fileState(path: string, label: string): FileState {
  try {
    const { size, mtimeMs, ino } = statSync(path, { bigint: true });
    return { sizeBytes: Number(size), modifiedMs: Number(mtimeMs), inode: String(ino) };
  } catch (error) {
    throw missing(label, error);
  }
}

/** @throws InputFault `file-missing`, `file-changed` when the file is not as it was */
export function checkUnchanged(path: string, label: string, expected: FileState): void {
  const now = fileState(path, label);
  for (const key of ['sizeBytes', 'modifiedMs', 'inode'] as const) {
    if (now[key] === expected[key]) continue;
    const detail = `${key} must be ${expected[key]} as when it was queued, got ${now[key]}`;
    throw new InputFault('file-changed', { file: label }, detail);
  }
}

function stateOf(file: number): FileState {
  const { size, mtimeMs, ino } = fstatSync(file, { bigint: true });
  return { sizeBytes: Number(size), modifiedMs: Number(mtimeMs), inode: String(ino) };
}

function readRange(file: number, label: string, offset: number, length: number): Uint8Array {
  const bytes = new Uint8Array(Math.max(0, length));
  let filled = 0;
  while (filled < bytes.length) {
    let got: number;
    try {
      got = readSync(file, bytes, filled, bytes.length - filled, offset + filled);
    } catch (error) {
      throw missing(label, error);
    }
    if (got === 0) break;
    filled += got;
  }
  return filled === bytes.length ? bytes : bytes.subarray(0, filled);
}

function undoGzip(packed: Uint8Array, label: string, limits: ReadLimits): Uint8Array {
  const byRatio = packed.length * limits.decompressionRatio;
  const maxOutputLength = Math.floor(Math.min(limits.decompressedBytes, byRatio));
  try {
    return gunzipSync(packed, { maxOutputLength });
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ERR_BUFFER_TOO_LARGE') {
      const detail = `decompressed size must be at most ${maxOutputLength} bytes, got more`;
      throw new InputFault('file-too-large', { file: label }, detail);
    }
    const detail = `gzip stream must decode, got: ${(error as Error).message}`;
    throw new InputFault('gzip-broken', { file: label }, detail);
  }
}

function missing(label: string, error: unknown): InputFault {
  const { code, message } = error as NodeJS.ErrnoException;
  return new InputFault(
    'file-missing',
    { file: label },
    `file must be there and readable, got ${code ?? message}`,
  );
}

function closeQuietly(file: number): void {
  try {
    closeSync(file);
  } catch {
    // It was closed before the fault; the fault is what matters.
  }
}
