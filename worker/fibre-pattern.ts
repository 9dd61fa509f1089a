import type { CatalogueRow, NightReason } from '../store/index.ts';
import { byCodeUnit } from '../store/index.ts';

/**
 * Answers of different targets agree this closely only when something in the instrument makes them: a fifth
 * of a pixel at R about 2000.
 */
const SAME_FEATURE_LN = 5e-5;

/** Chance puts two of a few dozen galaxies this close now and then, three almost never. */
const FEWEST_ALIKE = 3;

/** Stars crowd around zero, so only shifts that spread over a wide range can show a pattern. */
const LEAST_REDSHIFT = 0.01;

/**
 * Finds answers that repeat along a fibre or across an exposure: different targets, same redshift.
 * What sits at one wavelength on the detector looks like one redshift.
 *
 * @param rows in spectrum-id order
 * @returns a `fibre-pattern` for every spectrum of a pattern
 */
export function findFibrePatterns(rows: readonly CatalogueRow[]): NightReason[] {
  const candidates = rows.filter(
    (row) =>
      row.role === 'target' &&
      row.kind === 'galaxy' &&
      row.redshift !== null &&
      row.redshift > LEAST_REDSHIFT &&
      (row.lines_detected ?? 0) > 0,
  );
  const found = new Map<string, NightReason>();
  for (const [name, keyOf] of [
    ['fibre', (row: CatalogueRow) => (row.fibre === null ? null : String(row.fibre))],
    ['exposure', (row: CatalogueRow) => row.exposure_id],
  ] as const) {
    for (const [key, group] of grouped(candidates, keyOf)) {
      for (const alike of runsAlike(group)) {
        for (const row of alike) {
          if (found.has(row.spectrum_id)) continue;
          const sentence = `${alike.length} different targets of ${name} ${key} have this same redshift`;
          const reason = {
            ...({ word: 'fibre-pattern', weight: 'look', sentence } as const),
            numbers: { alike: alike.length },
          };
          found.set(row.spectrum_id, { spectrumId: row.spectrum_id, reason });
        }
      }
    }
  }
  return [...found.values()].sort(byCodeUnit((reason) => reason.spectrumId));
}

function grouped(rows: readonly CatalogueRow[], keyOf: (row: CatalogueRow) => string | null) {
  const groups = new Map<string, CatalogueRow[]>();
  for (const row of rows) {
    const key = keyOf(row);
    if (key === null) continue;
    const group = groups.get(key) ?? [];
    group.push(row);
    groups.set(key, group);
  }
  return groups;
}

/** Runs of neighbours in redshift that hold enough different targets. */
function* runsAlike(group: readonly CatalogueRow[]): Generator<CatalogueRow[]> {
  const sorted = group.toSorted((a, b) => a.redshift! - b.redshift!);
  let run: CatalogueRow[] = [];
  for (const row of [...sorted, null]) {
    const before = run.at(-1);
    const joins =
      row !== null &&
      (before === undefined || Math.log1p(row.redshift!) - Math.log1p(before.redshift!) <= SAME_FEATURE_LN);
    if (joins) {
      run.push(row);
      continue;
    }
    const targets = new Set(run.map(({ target_name, spectrum_id }) => target_name ?? spectrum_id));
    if (targets.size >= FEWEST_ALIKE) yield run;
    run = row === null ? [] : [row];
  }
}
