import type { Layout } from '../pipeline/decode/layout.ts';
import type { Role, Site } from '../pipeline/decode/spectrum.ts';
import type { TargetRow } from '../pipeline/decode/target-row.ts';
import type { InputFaultCode } from '../pipeline/errors.ts';
import type { ExposureContext } from '../pipeline/grid/exposure-context.ts';
import type { Answer, Reason } from '../pipeline/weigh/answer.ts';
import type { Kind } from '../templates/family.ts';
import type { CatalogueRow } from './catalogue-row.ts';
import type { NightFacts, SpectrumDetail } from './night-reader.ts';

/** Values that survive JSON unchanged. */
export type Json = string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json };

/** One observing date's batch. */
export interface NightRecord {
  readonly name: string;
  /** The recipe whose rows are shown; null before the first run. */
  readonly currentRecipe: string | null;
  readonly currentRun: string | null;
  /** Measuring options, profile text and the rest a worker needs to take the night up. */
  readonly settings: Json;
}

/** One file of a night, as it was when it was planned. */
export interface InputRecord {
  readonly id: string;
  readonly night: string;
  /** Where the file is on the machine that planned it (absolute, real). */
  readonly path: string;
  /** The PATH given on the command line that it was found under (absolute, real). */
  readonly root: string;
  /** Path relative to the PATH given, with `/`, suffixes kept: what the catalogue calls the file. */
  readonly relativePath: string;
  readonly sizeBytes: number;
  readonly modifiedMs: number;
  /** Device-wide file number; a string because it may need 64 bits. */
  readonly inode: string;
  /** Null only when the file could not be read to its end. */
  readonly sha256: string | null;
  /** Null when nothing was recognised; `fault` then says why. */
  readonly layout: Layout | null;
  readonly fault: { readonly code: InputFaultCode; readonly detail: string } | null;
  /** Spectra of one exposure share noise; null for a file that holds a single spectrum of no stated exposure. */
  readonly exposureKey: string | null;
}

/** A spectrum that must end with a row. */
export interface ExpectedSpectrum {
  readonly spectrumId: string;
  readonly inputId: string;
  /** Position in the layout: what the reader is asked for. */
  readonly ordinal: number;
  readonly hdu: number | null;
  readonly row: number | null;
}

/** An expected spectrum with what a table of the file says of its target, before a pixel is read. */
export interface PlannedSpectrum extends ExpectedSpectrum {
  /** Null where the file has no such table: only reading the spectrum can tell. */
  readonly target: TargetRow | null;
}

/** What the file says about a spectrum, kept with its row. */
export interface SpectrumFacts {
  readonly targetName: string | null;
  readonly raDeg: number | null;
  readonly decDeg: number | null;
  readonly field: string | null;
  readonly exposureId: string | null;
  readonly fibre: number | null;
  readonly role: Role;
  readonly targetClass: string | null;
  readonly observedAt: string | null;
  readonly exposureS: number | null;
  readonly magnitude: number | null;
  readonly magnitudeBand: string | null;
  readonly frame: string;
  readonly site: Site | null;
}

/** Why a spectrum has no answer. `over-limits` is a spectrum that had to be set aside, not a bad file. */
export interface Fault {
  readonly word: 'unreadable' | 'over-limits';
  readonly code: InputFaultCode | 'time-limit' | 'memory-limit' | 'failed-inside';
  readonly detail: string;
}

/** What one spectrum ended as: an answer or a fault. */
export interface Outcome {
  readonly spectrumId: string;
  readonly inputSha256: string | null;
  /** Null when the spectrum could not be read. */
  readonly facts: SpectrumFacts | null;
  readonly result:
    | { readonly answer: Answer; readonly curves: Uint8Array | null }
    | { readonly fault: Fault };
}

/** A run of spectra of one input: ordinals `first .. first + count - 1`. */
export interface OrdinalRange {
  readonly inputId: string;
  readonly first: number;
  readonly count: number;
}

/** An expected spectrum that still lacks a current row. */
export interface PendingSpectrum extends ExpectedSpectrum {
  readonly exposureKey: string | null;
}

export interface RunRecord {
  readonly runId: string;
  readonly night: string;
  readonly recipeHash: string;
  readonly startedAt: string;
  readonly finishedAt: string | null;
  /** Milliseconds spent per stage, summed over spectra, and how many spectra that was. */
  readonly stageMs: Readonly<Record<string, number>>;
  readonly spectraMeasured: number;
  readonly provenance: Json;
}

/** Counts of a night under its current recipe. */
export interface NightCounts {
  readonly expected: number;
  /** Spectra with a current row. */
  readonly done: number;
  /** Of those, rows that say unreadable or over-limits. */
  readonly faults: number;
  /** Of those, rows that ask for a person. */
  readonly needsReview: number;
}

/** A reason the night job found by comparing spectra. */
export interface NightReason {
  readonly spectrumId: string;
  readonly reason: Reason;
}

/** A thing in the sky over all its spectra of a night. */
export interface TargetRecord {
  readonly targetKey: string;
  readonly targetName: string | null;
  readonly raDeg: number | null;
  readonly decDeg: number | null;
  readonly spectra: number;
  readonly kind: Kind | null;
  readonly redshift: number | null;
  readonly clash: boolean;
}

export type VerdictWord =
  | 'agree'
  | 'take-candidate'
  | 'set-redshift'
  | 'set-kind'
  | 'no-redshift'
  | 'bad-data'
  | 'two-objects'
  | 'second-opinion';

/** What a person decided. Never overwritten, only followed. */
export interface VerdictRecord {
  readonly spectrumId: string;
  readonly verdict: VerdictWord;
  readonly redshift: number | null;
  readonly kind: Kind | null;
  readonly certainty: 'sure' | 'leaning';
  readonly reviewer: string;
  /** ISO 8601 UTC. */
  readonly at: string;
  readonly remark: string | null;
}

/**
 * Everything that is remembered. One contract, several backends; the suite in tests/store runs over each.
 *
 * - Not-finite numbers never enter: they become null at the border.
 * - Every write is a transaction that holds after a power cut once its promise resolves.
 * - Writing the same thing twice changes nothing.
 * - Lists come in code-unit order of their id.
 * - Throws EnvironmentFault when the disk is full, the server is gone or the file is not a store.
 */
export interface Store {
  /** Makes the night, or brings its settings up to date. */
  saveNight(night: Pick<NightRecord, 'name' | 'settings'>): Promise<void>;
  night(name: string): Promise<NightRecord | null>;
  nights(): Promise<readonly NightRecord[]>;
  /** Names the recipe whose rows are shown from now on, and the run that works on it. */
  startRun(run: RunRecord): Promise<void>;
  /** Adds to the stage times of a run and the number of spectra measured in it. */
  addStageTimes(runId: string, stageMs: Readonly<Record<string, number>>, spectra: number): Promise<void>;
  finishRun(runId: string, finishedAt: string): Promise<void>;
  runs(night: string): Promise<readonly RunRecord[]>;

  /**
   * Records an input and the spectra expected of it, replacing what an earlier plan expected of the same
   * input. Measurements are kept: they stop being current when the sha256 differs.
   */
  savePlan(input: InputRecord, spectra: readonly PlannedSpectrum[]): Promise<void>;
  inputs(night: string): Promise<readonly InputRecord[]>;
  input(inputId: string): Promise<InputRecord | null>;
  /** Spectra without a current row: never measured under the recipe, measured from other bytes, or requeued. */
  pending(night: string, recipeHash: string): Promise<readonly PendingSpectrum[]>;
  /** Those of the given ranges that are still pending. */
  pendingIn(ranges: readonly OrdinalRange[], recipeHash: string): Promise<readonly PendingSpectrum[]>;
  counts(night: string): Promise<NightCounts>;

  exposureContext(night: string, exposureKey: string, recipeHash: string): Promise<ExposureContext | null>;
  saveExposureContext(
    night: string,
    exposureKey: string,
    recipeHash: string,
    context: ExposureContext,
  ): Promise<void>;

  /** One chunk: one transaction of upserts, keyed by spectrum and recipe. Takes its spectra off the requeue list. */
  saveOutcomes(outcomes: readonly Outcome[], recipeHash: string, runId: string, at: string): Promise<void>;
  /** Spectra whose current row carries one of these fault codes. */
  spectraWithFault(night: string, codes: readonly Fault['code'][]): Promise<readonly ExpectedSpectrum[]>;
  /** Every expected spectrum of a night, whatever its row. */
  expected(night: string): Promise<readonly ExpectedSpectrum[]>;
  /** Marks spectra to be measured again; ids that are not expected are ignored. Returns how many were marked. */
  requeue(spectrumIds: readonly string[], at: string): Promise<number>;

  /** Replaces what the night job found before. */
  saveNightFindings(
    night: string,
    recipeHash: string,
    reasons: readonly NightReason[],
    targets: readonly TargetRecord[],
  ): Promise<void>;
  targets(night: string): Promise<readonly TargetRecord[]>;

  addVerdict(verdict: VerdictRecord): Promise<void>;

  facts(night: string): Promise<NightFacts>;
  /** Rows under the current recipe, settled by the last verdict; spectra without a current row are absent. */
  rows(night: string): Promise<readonly CatalogueRow[]>;
  /** Details of every row of the night; curves are unpacked when they are asked for. */
  details(night: string): Promise<ReadonlyMap<string, () => SpectrumDetail>>;

  close(): Promise<void>;
}
