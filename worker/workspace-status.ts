import { existsSync } from 'node:fs';
import { openSqliteStore, type Store } from '../store/index.ts';
import { queueOwner } from './owner-lock.ts';
import { workspaceAt } from './workspace.ts';

export interface NightStatus {
  readonly name: string;
  readonly expected: number;
  readonly done: number;
  readonly waiting: number;
  readonly faults: number;
  readonly needsReview: number;
  /** Of the run that is going on; null when none is, or nothing was measured yet. */
  readonly spectraPerSecond: number | null;
  readonly secondsLeft: number | null;
}

export interface WorkspaceStatus {
  readonly owner: { readonly pid: number; readonly startedAt: string } | null;
  readonly nights: readonly NightStatus[];
}

/** Reads the state of every night from the store alone; an absent workspace has no nights. */
export async function workspaceStatus(directory: string, now: Date): Promise<WorkspaceStatus> {
  const workspace = workspaceAt(directory);
  const owner = queueOwner(workspace.queue);
  if (!existsSync(workspace.store)) return { owner, nights: [] };
  const store = await openSqliteStore(workspace.store, { readOnly: true });
  try {
    const nights: NightStatus[] = [];
    for (const { name, currentRecipe, currentRun } of await store.nights()) {
      const counts = await store.counts(name);
      const waiting =
        currentRecipe === null ? counts.expected : (await store.pending(name, currentRecipe)).length;
      const run = (await store.runs(name)).find(({ runId }) => runId === currentRun);
      const seconds = run === undefined ? 0 : (now.getTime() - Date.parse(run.startedAt)) / 1_000;
      const going = run?.finishedAt === null && run.spectraMeasured > 0 && seconds > 0 && owner !== null;
      const spectraPerSecond = going ? run.spectraMeasured / seconds : null;
      const secondsLeft = spectraPerSecond === null ? null : waiting / spectraPerSecond;
      nights.push({ name, ...counts, waiting, spectraPerSecond, secondsLeft });
    }
    return { owner, nights };
  } finally {
    await store.close();
  }
}

/**
 * Marks spectra of a night to be measured again by the next worker or run.
 *
 * @returns how many were marked; null when there is no such night
 */
export async function requeueSpectra(
  directory: string,
  night: string,
  chosen: 'all' | 'failed' | readonly string[],
): Promise<number | null> {
  const workspace = workspaceAt(directory);
  if (!existsSync(workspace.store)) return null;
  const store = await openSqliteStore(workspace.store);
  try {
    if ((await store.night(night)) === null) return null;
    return await store.requeue(await chosenIds(store, night, chosen), new Date().toISOString());
  } finally {
    await store.close();
  }
}

async function chosenIds(store: Store, night: string, chosen: 'all' | 'failed' | readonly string[]) {
  if (chosen === 'all') return (await store.expected(night)).map(({ spectrumId }) => spectrumId);
  if (chosen === 'failed') {
    const rows = await store.rows(night);
    return rows
      .filter(({ reasons }) => /\b(unreadable|over-limits)\b/.test(reasons))
      .map((row) => row.spectrum_id);
  }
  return chosen;
}
