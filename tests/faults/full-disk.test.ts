import { expect, it } from 'vitest';
import { EnvironmentFault, openSqliteStore } from '../../store/index.ts';
import { statusOf } from '../../cli/exit-status.ts';
import { freshFolder } from '../worker/practice-folder.ts';

/** SQLite itself refuses to grow past this many pages and reports SQLITE_FULL, as it does on a full disk. */
const FEW_PAGES = 40;

it('a store on a full disk says that the machine is at fault, the shell sees 4, and what was written stays', async () => {
  const store = await openSqliteStore(`${freshFolder('full')}/store.sqlite`, { maxPages: FEW_PAGES });
  const fill = async () => {
    for (let i = 0; ; i++) await store.saveNight({ name: `night ${i}`, settings: 'x'.repeat(20_000) });
  };
  let thrown: unknown;
  const status = await statusOf(() =>
    fill().catch((error: unknown) => {
      thrown = error;
      throw error;
    }),
  );
  expect(thrown).toBeInstanceOf(EnvironmentFault);
  expect(status).toBe(4);
  expect((await store.nights()).length).toBeGreaterThan(0);
  await store.close();
});
