import 'reflect-metadata';
import type BetterSqlite3 from 'better-sqlite3';
import { DataSource, type Logger } from 'typeorm';
import { entities } from './entities/all';
import { SLOW_QUERY_MS } from './middleware/query-log';
import { migrations } from './migrations/all';

/** How long a statement waits for another process' lock (a backup, a shell) before it gives up, ms. */
const busyTimeoutMs = 5000;

/**
 * Sets what SQLite forgets between connections. `synchronous` is set after the journal mode, because better-sqlite3
 * drops it to NORMAL when WAL is switched on, and a started charge must survive the plug.
 */
function prepareDatabase(database: BetterSqlite3.Database): void {
  database.pragma('journal_mode = WAL');
  database.pragma('synchronous = FULL');
  database.pragma('foreign_keys = ON');
  database.pragma(`busy_timeout = ${busyTimeoutMs}`);
}

/**
 * The one connection of the process; `:memory:` for tests.
 * @param logger hears of slow statements; left out: nobody does
 */
export function makeDataSource(database: string, logger?: Logger): DataSource {
  return new DataSource({
    type: 'better-sqlite3',
    database,
    entities,
    migrations,
    migrationsTransactionMode: 'each',
    synchronize: false,
    ...(logger ? { logger, maxQueryExecutionTime: SLOW_QUERY_MS } : {}),
    prepareDatabase: (connection: BetterSqlite3.Database) => prepareDatabase(connection),
  });
}

/**
 * Reads the settings back from the running connection.
 * @throws Error naming the setting that did not take: the server must not start on a database that may lose a commit.
 */
export async function assertDurable(dataSource: DataSource): Promise<void> {
  const read = async (name: string): Promise<unknown> => {
    const rows = (await dataSource.query(`PRAGMA ${name}`)) as Record<string, unknown>[];
    return Object.values(rows[0] ?? {})[0];
  };
  const memory = dataSource.options.database === ':memory:';
  const wanted: Record<string, unknown> = {
    journal_mode: memory ? 'memory' : 'wal',
    synchronous: 2,
    foreign_keys: 1,
    busy_timeout: busyTimeoutMs,
  };
  for (const [name, value] of Object.entries(wanted)) {
    const found = await read(name);
    if (found !== value)
      throw new Error(`The database runs with ${name} = ${String(found)}; it must be ${String(value)}.`);
  }
}
