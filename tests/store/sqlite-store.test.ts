import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { EnvironmentFault, openSqliteStore } from '../../store/index.ts';
import { storeContract } from './store-contract.ts';

const freshPath = () => join(mkdtempSync(join(tmpdir(), 'shiftwork-store-')), 'store.sqlite');

storeContract('SQLite', () => openSqliteStore(freshPath()));

it('openSqliteStore() says that a folder which is not there is the machine at fault', async () => {
  await expect(openSqliteStore('/nowhere/at/all/store.sqlite')).rejects.toThrow(EnvironmentFault);
});

it('openSqliteStore() lets a second process read while the first one writes', async () => {
  const path = freshPath();
  const writer = await openSqliteStore(path);
  await writer.saveNight({ name: 'a', settings: {} });
  const reader = await openSqliteStore(path, { readOnly: true });
  expect((await reader.nights()).map(({ name }) => name)).toEqual(['a']);
  await reader.close();
  await writer.close();
});
