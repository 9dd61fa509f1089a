import type { ScoredRow } from './catalogue-table.ts';
import type { TruthRow } from './truth-table.ts';

/** A truth and the catalogue row that speaks of the same spectrum; null when the catalogue has none. */
export interface Pair {
  readonly truth: TruthRow;
  readonly answer: ScoredRow | null;
}

/**
 * Finds the catalogue row of each truth row: same file, and same row of it or same target name. A truth file
 * and a catalogue file are the same when one path is the end of the other, because a catalogue's paths are
 * relative to whatever folder was measured. When several rows fit, the first of the catalogue is taken.
 */
export function joined(rows: readonly ScoredRow[], truth: readonly TruthRow[]): Pair[] {
  const byName = new Map<string, ScoredRow[]>();
  for (const row of rows) {
    const name = lastPart(row.inputFile);
    const list = byName.get(name);
    if (list === undefined) byName.set(name, [row]);
    else list.push(row);
  }
  return truth.map((each) => ({
    truth: each,
    answer: (byName.get(lastPart(each.file)) ?? []).find((row) => isSame(row, each)) ?? null,
  }));
}

function isSame(row: ScoredRow, truth: TruthRow): boolean {
  if (!endsAlike(row.inputFile, truth.file)) return false;
  if (truth.row !== null) return row.inputRow === truth.row;
  return truth.select === '' || row.targetName === truth.select;
}

function endsAlike(a: string, b: string): boolean {
  return `/${a}`.endsWith(`/${b}`) || `/${b}`.endsWith(`/${a}`);
}

function lastPart(path: string): string {
  return path.slice(path.lastIndexOf('/') + 1);
}
