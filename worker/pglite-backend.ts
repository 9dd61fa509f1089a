import { PGlite } from '@electric-sql/pglite';
import { EventEmitter } from 'node:events';

/** What BullMQ's PostgreSQL backend asks of a pool of connections, as far as it uses one. */
export interface PoolLike {
  query(text: string, values?: readonly unknown[]): Promise<{ rows: never[]; rowCount: number }>;
  connect(): Promise<PoolLike & { release(): void }>;
  end(): Promise<void>;
  on(event: string, listener: (...values: unknown[]) => void): PoolLike;
  removeListener(event: string, listener: (...values: unknown[]) => void): PoolLike;
  removeAllListeners(event?: string): PoolLike;
  /** Read by BullMQ to decide how long a worker may sleep: nothing can silently drop this connection. */
  readonly options: { readonly keepAlive: true };
}

/** Type number of int8 (pg_type.dat): kept as text, as node-postgres does and BullMQ expects. */
const INT8 = 20;

/**
 * PostgreSQL inside this process, dressed as a pool of connections. There is one connection, so `connect`
 * hands out the pool itself; statements never interleave because PGlite queues them.
 *
 * At most one process may have `directory` open: two lose data without a word (hold the owner's lock).
 * What it holds is not synced to disk: only a queue that can be refilled from the store belongs here.
 *
 * @param directory made when absent; null keeps everything in memory
 * @throws Error when the directory holds a damaged database
 */
export async function openEmbeddedPool(directory: string | null): Promise<PoolLike> {
  const database = await PGlite.create(directory ?? 'memory://', {
    parsers: { [INT8]: (text: string) => text },
  });
  const events = new EventEmitter();
  // Every queue and worker object listens here, more of them than the default warning allows.
  events.setMaxListeners(0);
  database.onNotification((channel, payload) => events.emit('notification', { channel, payload }));
  const listening = new Set<string>();

  const query = async (text: string, values: readonly unknown[] = []) => {
    if (/^\s*listen\s/i.test(text)) {
      if (listening.has(text)) return { rows: [], rowCount: 0 };
      listening.add(text);
    }
    if (values.length > 0) {
      const { rows, affectedRows } = await database.query(text, [...values]);
      return { rows: rows as never[], rowCount: affectedRows ?? rows.length };
    }
    // Without values a text may hold several statements; only exec takes those. The last result counts.
    const results = await database.exec(text);
    const last = results.at(-1);
    return { rows: (last?.rows ?? []) as never[], rowCount: last?.affectedRows ?? last?.rows.length ?? 0 };
  };
  const pool: PoolLike & { release(): void } = {
    options: { keepAlive: true },
    query,
    connect: () => Promise.resolve(pool),
    release: () => undefined,
    end: () => (database.closed ? Promise.resolve() : database.close()),
    on: (event, listener) => {
      events.on(event, listener);
      return pool;
    },
    removeListener: (event, listener) => {
      events.removeListener(event, listener);
      return pool;
    },
    removeAllListeners: (event) => {
      events.removeAllListeners(event);
      return pool;
    },
  };
  return pool;
}
