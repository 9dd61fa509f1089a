import { createHash } from 'node:crypto';
import { basename } from 'node:path';
import type { InputProfile } from '../config/profile.ts';
import type { InputRecord, PlannedSpectrum } from '../store/index.ts';
import { inspectInput, type InspectedInput, isBystander } from './inspect-input.ts';
import { observingNight } from './night-name.ts';
import { expectedSpectra, fileNames } from './spectrum-id.ts';
import { PathFault, walkPaths } from './walk-paths.ts';

/** Fewer spectra than this say nothing together about an exposure's noise (see pipeline/grid). */
const FEWEST_OF_AN_EXPOSURE = 3;

/** A night before it is in the store: every spectrum that must end with a row. */
export interface NightPlan {
  readonly night: string;
  readonly inputs: readonly { readonly input: InputRecord; readonly spectra: readonly PlannedSpectrum[] }[];
  /** Files that lay beside the spectra, with why they are not taken for spectra. */
  readonly leftOut: readonly { readonly relativePath: string; readonly why: string }[];
}

export interface PlanRequest {
  readonly paths: readonly string[];
  /** Null: the observing night of the earliest exposure, else the folder's name. */
  readonly night: string | null;
  readonly profile: InputProfile | null;
  /** Folders not to enter, real and absolute. */
  readonly skip: readonly string[];
  readonly onFile?: (done: number, of: number) => void;
}

/**
 * Walks the PATHs, reads each file once, and lists every spectrum expected.
 *
 * @throws PathFault when a PATH does not exist or nothing under the PATHs may hold spectra
 */
export async function planNight(request: PlanRequest): Promise<NightPlan> {
  const files = walkPaths(request.paths, request.skip);
  const inspected: InspectedInput[] = [];
  const leftOut: { relativePath: string; why: string }[] = [];
  for (const [i, file] of files.entries()) {
    const input = await inspectInput(file, request.profile);
    if (isBystander(input)) leftOut.push({ relativePath: file.relativePath, why: input.fault!.message });
    else inspected.push(input);
    request.onFile?.(i + 1, files.length);
  }
  if (inspected.length === 0) {
    throw new PathFault(`PATH must hold spectra, got none under ${request.paths.join(', ')}`);
  }
  const night = request.night ?? nightNameOf(inspected);
  const names = fileNames(inspected.map(({ file }) => file.relativePath));
  const exposures = exposureKeys(inspected, names);
  const inputs = inspected.map((one, i) => {
    const id = inputId(night, one.file.path);
    const input: InputRecord = {
      id,
      night,
      path: one.file.path,
      root: one.file.root,
      relativePath: one.file.relativePath,
      ...one.state,
      sha256: one.sha256,
      layout: one.layout,
      fault: one.fault === null ? null : { code: one.fault.code, detail: one.fault.message },
      exposureKey: exposures[i]!,
    };
    return { input, spectra: expectedSpectra(night, names[i]!, id, one.layout, one.targets) };
  });
  return { night, inputs, leftOut };
}

/** Short, stable, and safe in a job: the night and the path decide it. */
function inputId(night: string, path: string): string {
  return createHash('sha256').update(`${night}\n${path}`).digest('hex').slice(0, 24);
}

function nightNameOf(inspected: readonly InspectedInput[]): string {
  const nights = inspected.flatMap(({ example }) => {
    if (example?.observedAt == null || example.site === null) return [];
    return observingNight(example.observedAt, example.site.longitudeEastDeg) ?? [];
  });
  const earliest = nights.sort((a, b) => (a < b ? -1 : 1))[0];
  return earliest ?? (basename(inspected[0]!.file.root) || 'night');
}

/**
 * Which files share an exposure: by the exposure's own name where files state it, else each file with several
 * spectra is one. Null where too few spectra come together to tell anything about their noise.
 */
function exposureKeys(inspected: readonly InspectedInput[], names: readonly string[]): (string | null)[] {
  const keys = inspected.map(({ example, layout }, i) => {
    if (layout === null) return null;
    const stated = example?.exposureId ?? null;
    return stated === null ? `file ${names[i]}` : `exposure ${stated}`;
  });
  const spectra = new Map<string, number>();
  keys.forEach((key, i) => {
    if (key !== null) spectra.set(key, (spectra.get(key) ?? 0) + inspected[i]!.layout!.rowCount);
  });
  return keys.map((key) => (key !== null && spectra.get(key)! >= FEWEST_OF_AN_EXPOSURE ? key : null));
}
