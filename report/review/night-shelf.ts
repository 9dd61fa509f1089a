import { existsSync } from 'node:fs';
import { readdir, readFile } from 'node:fs/promises';
import { basename, join } from 'node:path';
import type { NightCounts, Store } from '../../store/index.ts';
import { byCodeUnit, openSqliteStore } from '../../store/index.ts';

/** Where the nights of a workspace are. */
export interface ReviewPlaces {
  /** The store's file; it need not exist. */
  readonly store: string;
  /** Folder of the nights' folders; it need not exist. */
  readonly nights: string;
  /** Folder of what is handed out of one night. */
  night(name: string): string;
}

/** A night that may be looked at. */
export interface ShelvedNight {
  readonly name: string;
  readonly directory: string;
  /** Names of the files in its folder. */
  readonly files: ReadonlySet<string>;
}

/**
 * Every night the store knows and every folder of a night handed over without its store. Only what is in this
 * list is ever served.
 *
 * @returns in code-unit order of the names
 * @throws EnvironmentFault when the store cannot be read
 */
export async function shelvedNights(places: ReviewPlaces): Promise<readonly ShelvedNight[]> {
  const directories = new Map<string, string>();
  const named = (await inStore(places, (store) => store.nights())) ?? [];
  for (const { name } of named) directories.set(name, places.night(name));
  const taken = new Set([...directories.values()].map((directory) => basename(directory)));
  for (const folder of await entries(places.nights)) {
    // A hidden folder is no night: a night's folder never starts with a dot.
    if (!folder.isDirectory() || folder.name.startsWith('.') || taken.has(folder.name)) continue;
    directories.set(folder.name, join(places.nights, folder.name));
  }
  const nights = [...directories].map(async ([name, directory]) => {
    const files = (await entries(directory)).filter((entry) => entry.isFile());
    return { name, directory, files: new Set(files.map((file) => file.name)) };
  });
  return (await Promise.all(nights)).sort(byCodeUnit(({ name }) => name));
}

/**
 * How far nights are: from the store, else from the `run.json` in the folder.
 *
 * @returns null for a night of which neither says anything
 */
export async function countsOfNights(
  places: ReviewPlaces,
  nights: readonly ShelvedNight[],
): Promise<readonly (NightCounts | null)[]> {
  const stored = await inStore(places, async (store) => {
    const counts = new Map<string, NightCounts>();
    for (const { name } of await store.nights()) counts.set(name, await store.counts(name));
    return counts;
  });
  return Promise.all(
    nights.map(async (night) => stored?.get(night.name) ?? (await recordedCounts(night.directory))),
  );
}

/** Opened for each look, so that a page shows what another process has just written. */
async function inStore<T>(places: ReviewPlaces, read: (store: Store) => Promise<T>): Promise<T | null> {
  if (!existsSync(places.store)) return null;
  const store = await openSqliteStore(places.store, { readOnly: true });
  try {
    return await read(store);
  } finally {
    await store.close();
  }
}

/** A folder that is absent, or gone since it was listed, has no entries. */
async function entries(directory: string) {
  return readdir(directory, { withFileTypes: true }).catch(() => []);
}

/** Counts as report/run-record.ts writes them. */
async function recordedCounts(directory: string): Promise<NightCounts | null> {
  let record: unknown;
  try {
    record = JSON.parse(await readFile(join(directory, 'run.json'), 'utf8'));
  } catch {
    return null;
  }
  const counts = member(record, 'counts');
  const [expected, done, flagged, unreadable] = ['expected', 'rows', 'flagged', 'unreadable'].map((key) => {
    const value = member(counts, key);
    return typeof value === 'number' ? value : null;
  });
  if (expected == null || done == null || flagged == null || unreadable == null) return null;
  return { expected, done, faults: unreadable, needsReview: flagged + unreadable };
}

function member(value: unknown, key: string): unknown {
  return typeof value === 'object' && value !== null ? (value as Record<string, unknown>)[key] : undefined;
}
