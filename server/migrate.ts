import type { DataSource } from 'typeorm';
import type { Logger } from 'pino';
import { backUp } from './back-up';
import { backupFolder, databaseFile } from './data-files';

/** Migrations that have run, oldest first; none on a new database. */
async function ran(dataSource: DataSource): Promise<string[]> {
  const [{ there }] = (await dataSource.query(
    "SELECT count(*) AS there FROM sqlite_master WHERE type = 'table' AND name = 'migrations'",
  )) as [{ there: number }];
  if (there === 0) return [];
  const rows = (await dataSource.query('SELECT name FROM migrations ORDER BY id')) as { name: string }[];
  return rows.map(({ name }) => name);
}

/**
 * Brings the database to the tables this version works with. One that holds something is copied into the backups first.
 * @returns the names of the migrations that ran now
 * @throws Error for a database of a later version, which this one would damage
 */
export async function migrate(dataSource: DataSource, dataDir: string, now: number, log: Logger): Promise<string[]> {
  const before = await ran(dataSource);
  const known = new Set(dataSource.migrations.map((migration) => migration.name));
  const unknown = before.filter((name) => !known.has(name));
  if (unknown.length > 0)
    throw new Error(`The database is of a later version of Bidewell (${unknown.join(', ')}). Start that version.`);
  if (before.length > 0 && before.length < known.size) {
    const file = await backUp(databaseFile(dataDir), backupFolder(dataDir), new Date(now));
    log.info({ file }, 'database copied before its migration');
  }
  const done = await dataSource.runMigrations();
  return done.map(({ name }) => name);
}
