import type { Layout } from '../pipeline/decode/layout.ts';
import type { TargetRow } from '../pipeline/decode/target-row.ts';
import type { PlannedSpectrum } from '../store/index.ts';

/** `.fits`, `.csv.gz` and the like: an ending of letters and digits, and the `.gz` that may follow. */
const ENDING = /\.[A-Za-z][A-Za-z0-9]*(\.gz)?$/i;

/**
 * What spectrum ids call each file of a night: its relative path without suffixes where that is unlike every
 * other, else with its suffixes, else with a number as well.
 *
 * @param relativePaths in a fixed order; earlier files keep the shorter name when a later one is the same
 * @param taken names that other files of the night already have
 * @returns one name per path, all different
 */
export function fileNames(
  relativePaths: readonly string[],
  taken: ReadonlySet<string> = new Set(),
): string[] {
  const bare = relativePaths.map((path) => path.replace(ENDING, '') || path);
  const used = new Set(taken);
  return relativePaths.map((path, i) => {
    const shared = bare.filter((name) => name === bare[i]).length > 1;
    let name = shared ? path : bare[i]!;
    if (used.has(name)) name = path;
    for (let number = 2; used.has(name); number++) name = `${path}(${number})`;
    used.add(name);
    return name;
  });
}

/**
 * The spectra a file promises: `night/name#HDU.row`, or `night/name#HDU` where an HDU holds one spectrum.
 * A file of which nothing could be recognised promises one row that says so: `night/name`.
 *
 * @param targets what a table of the file says of each spectrum, by ordinal; may be shorter than the file
 */
export function expectedSpectra(
  night: string,
  name: string,
  inputId: string,
  layout: Layout | null,
  targets: readonly TargetRow[],
): PlannedSpectrum[] {
  if (layout === null) {
    return [{ spectrumId: `${night}/${name}`, inputId, ordinal: 0, hdu: null, row: null, target: null }];
  }
  const hdu = layout.arms[0]?.flux.hdu ?? 0;
  const byRow = layout.form === 'row-stack' || layout.form === 'table-row-per-spectrum';
  return Array.from({ length: Math.max(1, layout.rowCount) }, (_, ordinal) => ({
    spectrumId: byRow ? `${night}/${name}#${hdu}.${ordinal}` : `${night}/${name}#${hdu}`,
    inputId,
    ordinal,
    hdu,
    row: byRow ? ordinal : null,
    target: targets[ordinal] ?? null,
  }));
}
