import type { InputProfile } from '../config/profile.ts';
import {
  DEFAULT_READ_LIMITS,
  type Layout,
  openInput,
  readSpectra,
  readTargets,
  recogniseLayout,
  type Spectrum,
  type TargetRow,
} from '../pipeline/decode/index.ts';
import { InputFault } from '../pipeline/errors.ts';
import { type FileState, hashFile, openFile } from './input-file.ts';
import type { FoundFile } from './walk-paths.ts';

/** What planning learns of one file. */
export interface InspectedInput {
  readonly file: FoundFile;
  readonly state: FileState;
  /** Null when it could not be read to its end. */
  readonly sha256: string | null;
  readonly layout: Layout | null;
  readonly fault: InputFault | null;
  /** The first spectrum that can be read: its exposure, time and site stand for the file's. */
  readonly example: Spectrum | null;
  /** What a table of the file says each spectrum is of, by ordinal; empty where none was looked for. */
  readonly targets: readonly TargetRow[];
}

/** A file nobody could stat has this state; it will differ from whatever is found later. */
const NO_STATE: FileState = { sizeBytes: 0, modifiedMs: 0, inode: '0' };

/** Rows tried for an example before giving up on the file's time and site. */
const MOST_EXAMPLES = 8;

/**
 * Reads a file once for its hash and looks at how its spectra are laid out. Never throws for a bad file: the
 * fault is part of what is learned.
 */
export async function inspectInput(file: FoundFile, profile: InputProfile | null): Promise<InspectedInput> {
  const nothing = {
    file,
    state: NO_STATE,
    sha256: null,
    layout: null,
    fault: null,
    example: null,
    targets: [],
  };
  let hashed: { sha256: string; state: FileState };
  try {
    hashed = await hashFile(file.path, file.relativePath);
  } catch (error) {
    if (error instanceof InputFault) return { ...nothing, fault: error };
    throw error;
  }
  try {
    const opened = openFile(file.path, file.relativePath);
    try {
      const input = openInput(opened.source, DEFAULT_READ_LIMITS);
      const layout = recogniseLayout(input, profile ?? undefined);
      let example: Spectrum | null = null;
      for (let row = 0; row < Math.min(layout.rowCount, MOST_EXAMPLES) && example === null; row++) {
        const [spectrum] = readSpectra(input, layout, row, 1);
        if (spectrum !== undefined && !(spectrum instanceof InputFault)) example = spectrum;
      }
      const targets = readTargets(input, layout, 0, layout.rowCount);
      return { ...nothing, ...hashed, layout, example, targets };
    } finally {
      opened.close();
    }
  } catch (error) {
    if (error instanceof InputFault) return { ...nothing, ...hashed, fault: error };
    throw error;
  }
}

/** Names that promise spectra: a file with one of these that holds none is a fault, not a bystander. */
const FITS_ENDING = /\.(fits?|fts)(\.gz)?$/i;
const NOT_A_SPECTRUM = new Set([
  'layout-unknown',
  'file-kind-unknown',
  'wavelength-missing',
  'text-malformed',
]);

/**
 * Whether a file only happens to lie beside the spectra (a note, a list of targets): a text found in a folder,
 * not named by the person, in which no spectrum was recognised. It is left out of the night and said so.
 */
export function isBystander({ file, fault }: InspectedInput): boolean {
  return (
    !file.named && fault !== null && NOT_A_SPECTRUM.has(fault.code) && !FITS_ENDING.test(file.relativePath)
  );
}
