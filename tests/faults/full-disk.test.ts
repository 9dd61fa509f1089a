import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { statusOf } from '../../cli/exit-status.ts';
import { DEFAULT_MEASURING_OPTIONS } from '../../config/measuring.ts';
import { EnvironmentFault, openSqliteStore } from '../../store/index.ts';
import { openLog } from '../../worker/log.ts';
import { planNight } from '../../worker/plan-night.ts';
import { recordPlan, runInStore } from '../../worker/run-night.ts';
import { workspaceAt } from '../../worker/workspace.ts';
import { freshWorkspace } from '../worker/fresh-workspace.ts';
import { exposureFile, freshFolder } from '../worker/practice-folder.ts';
import { practiceRequest, practiceRun, rowsOf } from '../worker/practice-run.ts';

/** SQLite itself refuses to grow past a number of pages and reports SQLITE_FULL, as it does on a full disk. */
const FEW_PAGES = 40;
/** So many rows do not fit into the room that the tables' first pages have to spare. */
const MANY_ROWS = 120;

/** The status the shell would see, and what was thrown on the way. */
async function endOf(work: () => Promise<unknown>) {
  let thrown: unknown;
  const status = await statusOf(() =>
    work().catch((error: unknown) => {
      thrown = error;
      throw error;
    }),
  );
  return { status, thrown };
}

it('a store on a full disk says that the machine is at fault, the shell sees 4, and what was written stays', async () => {
  const store = await openSqliteStore(`${freshFolder('full')}/store.sqlite`, { maxPages: FEW_PAGES });
  const { status, thrown } = await endOf(async () => {
    for (let i = 0; ; i++) await store.saveNight({ name: `night ${i}`, settings: 'x'.repeat(20_000) });
  });
  expect(thrown).toBeInstanceOf(EnvironmentFault);
  expect(status).toBe(4);
  expect((await store.nights()).length).toBeGreaterThan(0);
  await store.close();
});

it('a run whose disk fills up between plan and rows stops, says so with 4, and is completed once there is room', {
  timeout: 180_000,
}, async () => {
  const folder = join(freshFolder('night'), 'long');
  mkdirSync(folder);
  writeFileSync(join(folder, 'one.fits'), exposureFile('one', Array<number>(MANY_ROWS).fill(200), 3));
  const workspace = await freshWorkspace();
  const { store: path, logs } = workspaceAt(workspace);
  const planned = await openSqliteStore(path);
  const settings = { measuring: { ...DEFAULT_MEASURING_OPTIONS }, profile: null };
  const plan = await planNight({ paths: [folder], night: null, profile: null, skip: [] });
  await recordPlan(planned, plan, settings);
  await planned.close();

  // SQLite raises a limit below the present size to that size.
  const full = await openSqliteStore(path, { maxPages: 1 });
  const request = practiceRequest(folder, workspace);
  const { status, thrown } = await endOf(() =>
    runInStore(full, workspaceAt(workspace), request, openLog(logs)),
  );
  await full.close();
  expect(thrown).toBeInstanceOf(EnvironmentFault);
  expect((thrown as Error).message).toContain('full: make room and run again');
  expect(status).toBe(4);

  expect(await practiceRun(folder, workspace)).toMatchObject({ missing: 0 });
  expect(await rowsOf(workspace)).toHaveLength(MANY_ROWS);
});
