import { DatabaseSync, type DatabaseSyncInstance } from '@photostructure/sqlite';
import { Kysely, SqliteDialect } from 'kysely';
import type { Store } from './contract.ts';
import { asEnvironmentFault } from './environment-fault.ts';
import { createStore } from './kysely-store.ts';
import { migrate } from './migrations.ts';
import type { Database } from './schema.ts';

/** How long one process waits for another's transaction: four writers of 10,000 rows waited 1.4 s at worst. */
const BUSY_TIMEOUT_MS = 20_000;

/** Larger pages suit rows of a kilobyte and curves of ten; must be set before the first table. */
const PAGE_BYTES = 16_384;

export interface SqliteOptions {
  /** For readers of a workspace another process works on; the file must exist. */
  readonly readOnly?: boolean;
  /** Pages the file may grow to; a small number rehearses a full disk. */
  readonly maxPages?: number;
}

/**
 * Opens (and makes, and brings up to date) a store in one file.
 *
 * Write-ahead log with synchronous FULL: what a promise of the store has confirmed survives a power cut.
 *
 * @param path of the file; its folder must exist
 * @throws EnvironmentFault when the file cannot be opened or written, or is not a store
 */
export async function openSqliteStore(path: string, options: SqliteOptions = {}): Promise<Store> {
  try {
    const readOnly = options.readOnly ?? false;
    const sqlite = new DatabaseSync(path, { readOnly, timeout: BUSY_TIMEOUT_MS });
    if (!readOnly) {
      sqlite.exec(`pragma page_size = ${PAGE_BYTES}; pragma journal_mode = wal; pragma synchronous = full`);
    }
    if (options.maxPages !== undefined) sqlite.exec(`pragma max_page_count = ${options.maxPages}`);
    const db = new Kysely<Database>({ dialect: new SqliteDialect({ database: asKyselyDatabase(sqlite) }) });
    if (!readOnly) await migrate(db, { real: 'real', bytes: 'blob', whole: 'integer' });
    return createStore(db);
  } catch (error) {
    throw asEnvironmentFault(error);
  }
}

const NOTHING_CHANGED = { changes: 0, lastInsertRowid: 0 };

type SqlValue = null | number | bigint | string | Uint8Array;

/**
 * Kysely calls a statement with one array and asks whether it returns rows; node:sqlite's interface takes the
 * values one by one and takes no booleans.
 */
function asKyselyDatabase(sqlite: DatabaseSyncInstance) {
  const bind = (values: readonly unknown[]): SqlValue[] =>
    values.map((value) => (typeof value === 'boolean' ? Number(value) : (value as SqlValue)));
  return {
    close: () => {
      sqlite.close();
    },
    prepare: (text: string) => {
      const statement = sqlite.prepare(text);
      return {
        reader: statement.columns().length > 0,
        all: (values: readonly unknown[]) => statement.all(...bind(values)) as unknown[],
        run: (values: readonly unknown[]) => {
          // A full disk undoes the transaction by itself (sqlite.org/lang_transaction.html, 2.3); to undo it
          // again would be an error that hides the one that matters.
          if (text === 'rollback' && !sqlite.isTransaction) return NOTHING_CHANGED;
          const { changes, lastInsertRowid } = statement.run(...bind(values));
          return { changes, lastInsertRowid };
        },
        iterate: (values: readonly unknown[]) =>
          statement.iterate(...bind(values)) as IterableIterator<unknown>,
      };
    },
  };
}
