import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import { type CatalogueRow, openSqliteStore } from '../../store/index.ts';
import type { PoolOptions } from '../../worker/measure-pool.ts';
import { type RunRequest, type RunSummary, runNight } from '../../worker/run-night.ts';
import { workspaceAt } from '../../worker/workspace.ts';

/** Two threads with the stand-in measurement and short limits. */
export const PRACTICE_POOL: PoolOptions = {
  ...{ threads: 2, loadLimitMs: 60_000, spectrumLimitMs: 20_000, threadMegabytes: 512 },
  taskFile: new URL('./stand-in-task.ts', import.meta.url),
};

/** What is asked of a run over a folder with the stand-in measurement. */
export function practiceRequest(
  folder: string,
  workspace: string,
  changes: Partial<RunRequest> = {},
): RunRequest {
  return {
    ...{ paths: [folder], workspace, night: null, profile: null, measuring: DEFAULT_MEASURING_OPTIONS },
    chunkSize: 7,
    pool: PRACTICE_POOL,
    ...{ again: false, provenance: {}, signal: new AbortController().signal },
    progress: { planning: () => undefined, planned: () => undefined, measured: () => undefined },
    ...changes,
  };
}

/** A run of the whole program over a folder, with the stand-in measurement and short limits. */
export function practiceRun(
  folder: string,
  workspace: string,
  changes: Partial<RunRequest> = {},
): Promise<RunSummary> {
  return runNight(practiceRequest(folder, workspace, changes), () => Promise.resolve());
}

/** The rows of a workspace's only night, without the name of the run that wrote them. */
export async function rowsOf(workspace: string): Promise<CatalogueRow[]> {
  const store = await openSqliteStore(workspaceAt(workspace).store, { readOnly: true });
  try {
    const [night] = await store.nights();
    return (await store.rows(night!.name)).map((row) => ({ ...row, run_id: '' }));
  } finally {
    await store.close();
  }
}
