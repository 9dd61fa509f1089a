import type { CatalogueRow } from '../store/catalogue-row.ts';
import type { NightFacts } from '../store/night-reader.ts';
import { COLUMNS } from './catalogue/columns.ts';
import { summarise } from './night/summary.ts';

/**
 * `run.json`: what was measured, with what, and what came of it, so that a catalogue can be traced and repeated.
 * Keys stand in a fixed order; two runs over the same store give the same bytes.
 *
 * @param rows in catalogue order
 */
export function runRecord(facts: NightFacts, rows: readonly CatalogueRow[]): string {
  const summary = summarise(facts, rows);
  const record = {
    night: facts.name,
    run_id: facts.runId,
    recipe_hash: facts.recipeHash,
    started_at: facts.startedAt,
    finished_at: facts.finishedAt,
    counts: {
      expected: summary.expected,
      rows: summary.rows,
      missing: summary.missing,
      ...summary.outcomes,
    },
    reasons: Object.fromEntries(summary.reasons.map(({ word, count }) => [word, count])),
    milliseconds_per_spectrum: facts.stageMs,
    provenance: facts.provenance,
    columns: COLUMNS.map(({ name, type, unit, ucd, meaning }) => ({ name, type, unit, ucd, meaning })),
  };
  return `${JSON.stringify(record, null, 2)}\n`;
}
