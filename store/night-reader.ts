import type { CandidateSummary, Curves, LineMeasurement, Reason } from '../pipeline/weigh/answer.ts';
import type { CatalogueRow } from './catalogue-row.ts';

/** Facts of a night that are not per spectrum. */
export interface NightFacts {
  readonly name: string;
  readonly recipeHash: string | null;
  readonly runId: string | null;
  readonly expected: number;
  readonly measured: number;
  readonly startedAt: string | null;
  readonly finishedAt: string | null;
  /** Milliseconds per spectrum by stage, mean over the night; empty when not recorded. */
  readonly stageMs: Readonly<Record<string, number>>;
  /** Program version, configuration, template and input hashes: whatever run.json repeats. */
  readonly provenance: Readonly<Record<string, unknown>>;
}

/** What a page says about one spectrum beyond its catalogue row. */
export interface SpectrumDetail {
  readonly reasons: readonly Reason[];
  readonly candidates: readonly CandidateSummary[];
  readonly lines: readonly LineMeasurement[];
  /** Null when not kept (see rule 10 of the architecture: flagged rows and a seeded sample keep theirs). */
  readonly curves: Curves | null;
}

/** The only way report/ sees a night. Rows come in spectrum_id order (code units). */
export interface NightReader {
  facts(): NightFacts;
  rows(): readonly CatalogueRow[];
  detail(spectrumId: string): SpectrumDetail;
}
