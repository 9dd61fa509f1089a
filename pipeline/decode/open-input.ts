import { InputFault } from '../errors.ts';
import type { ByteSource } from './byte-source.ts';
import { readFits } from './fits/index.ts';
import type { FitsFile, ReadLimits } from './fits/index.ts';
import { parseText } from './text/parse-text.ts';
import { textAsFile } from './text/text-file.ts';

/** One input, opened: headers and structure are known, data are read on demand. */
export interface OpenedInput {
  readonly kind: 'fits' | 'text';
  /** A text is a file with one table whose columns are those of the text. */
  readonly file: FitsFile;
  readonly limits: ReadLimits;
}

/** Bytes looked at to tell text from binary data. */
const PROBE_BYTES = 4_096;

/**
 * Open an input: FITS by its first card, else text in columns.
 *
 * @param source already decompressed
 * @param limits what one file may cost
 * @throws InputFault `file-empty`, `file-kind-unknown` (also for compressed bytes), `file-too-large`, and those of
 * `readFits` and `parseText`
 */
export function openInput(source: ByteSource, limits: ReadLimits): OpenedInput {
  const place = { file: source.label };
  if (source.size === 0) throw new InputFault('file-empty', place, 'the file must hold bytes, got 0');
  const probe = source.read(0, Math.min(PROBE_BYTES, source.size));
  if (probe[0] === 0x1f && probe[1] === 0x8b) {
    const detail = 'the bytes must be uncompressed by whoever opens the file, got a gzip stream';
    throw new InputFault('file-kind-unknown', place, detail);
  }
  if (asciiOf(probe.subarray(0, 9)) === 'SIMPLE  =') {
    return { kind: 'fits', file: readFits(source, limits), limits };
  }
  if (probe.includes(0)) {
    throw new InputFault('file-kind-unknown', place, 'the file must be FITS or text, got other binary data');
  }
  if (source.size > limits.textBytes) {
    const detail = `a text must have at most ${limits.textBytes} bytes (textBytes), got ${source.size}`;
    throw new InputFault('file-too-large', place, detail);
  }
  const text = new TextDecoder('utf-8').decode(source.read(0, source.size)).replace(/^\uFEFF/, '');
  return { kind: 'text', file: textAsFile(source.label, parseText(text, place)), limits };
}

function asciiOf(bytes: Uint8Array): string {
  return String.fromCharCode(...bytes);
}
