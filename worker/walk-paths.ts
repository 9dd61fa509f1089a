import { readdirSync, realpathSync, statSync } from 'node:fs';
import { basename, dirname, join, relative, sep } from 'node:path';
import { byCodeUnit } from '../store/index.ts';

/** A file found under one of the PATHs given. */
export interface FoundFile {
  /** Real, absolute. */
  readonly path: string;
  /** The PATH it was found under (a folder), or its own folder when it was named itself. */
  readonly root: string;
  /** Relative to the PATH given, with `/`. */
  readonly relativePath: string;
  /** Named on the command line, so a person expects a row of it whatever it is. */
  readonly named: boolean;
}

/** A PATH that does not exist. Wrong usage. */
export class PathFault extends Error {
  override readonly name = 'PathFault';
}

/**
 * Endings of files that may hold spectra; `.gz` may follow. Folders hold much else, and only what looks like
 * data by its name is opened. A file named on the command line is opened whatever its name.
 */
const DATA_ENDINGS = /\.(fits?|fts|txt|dat|asc|ascii|csv|ecsv|tsv|vot|votable|xml)(\.gz)?$/i;

/**
 * Finds the files under the PATHs a person gave, each once, in code-unit order of their relative path.
 * Hidden files and folders are passed over; links are followed once, and only inside the PATH given.
 *
 * @param paths files or folders
 * @param skip folders not to enter (the workspace), real and absolute
 * @throws PathFault when a PATH does not exist
 */
export function walkPaths(paths: readonly string[], skip: readonly string[] = []): FoundFile[] {
  const found = new Map<string, FoundFile>();
  for (const given of paths) {
    const root = realPath(given);
    if (statSync(root).isDirectory()) {
      for (const path of filesUnder(root, skip)) {
        const relativePath = relative(root, path).split(sep).join('/');
        if (!found.has(path)) found.set(path, { path, root, relativePath, named: false });
      }
    } else {
      found.set(root, { path: root, root: dirname(root), relativePath: basename(root), named: true });
    }
  }
  return [...found.values()].sort(byCodeUnit((file) => file.relativePath));
}

function realPath(given: string): string {
  try {
    return realpathSync(given);
  } catch {
    throw new PathFault(`PATH must be a file or folder, got ${given}: it does not exist`);
  }
}

function* filesUnder(root: string, skip: readonly string[]): Generator<string> {
  const waiting = [root];
  const entered = new Set<string>();
  for (let folder = waiting.pop(); folder !== undefined; folder = waiting.pop()) {
    if (entered.has(folder) || skip.includes(folder)) continue;
    entered.add(folder);
    for (const entry of readdirSync(folder, { withFileTypes: true })) {
      if (entry.name.startsWith('.')) continue;
      const path = safeRealPath(join(folder, entry.name));
      // A link that leaves the PATH given would let a folder of data name any file of the machine.
      if (path === null || !(path === root || path.startsWith(root + sep))) continue;
      const kind = statSync(path);
      if (kind.isDirectory()) waiting.push(path);
      else if (kind.isFile() && DATA_ENDINGS.test(entry.name)) yield path;
    }
  }
}

function safeRealPath(path: string): string | null {
  try {
    return realpathSync(path);
  } catch {
    return null;
  }
}
