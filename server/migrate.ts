import fs from 'node:fs';
import path from 'node:path';
import type { DataSource } from 'typeorm';
import type { Logger } from 'pino';
import { backUp } from './back-up';
import { holdTheSame, listBackups } from './backup-files';
import { keysBeside } from './backup-keys';
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
 * Copies the database before its migration. Where the copy of an earlier start holds the same, that one is kept alone: a
 * server that fails and is started again and again must not fill the disk with copies.
 */
async function copyBefore(dataDir: string, now: number): Promise<string> {
  const folder = backupFolder(dataDir);
  const [last] = listBackups(folder).filter(({ byClock }) => !byClock);
  const file = await backUp(databaseFile(dataDir), folder, new Date(now));
  if (!last || last.file === file || !holdTheSame(last.file, file)) return file;
  for (const one of [keysBeside(file), file]) fs.rmSync(one, { force: true });
  return last.file;
}

/**
 * Brings the database to the tables this version works with. One that holds something is copied into the backups first.
 * @returns the names of the migrations that ran now
 * @throws Error for a database of a later version, which this one would damage; or where a migration fails: it leaves
 *   nothing behind, and those before it stay
 */
export async function migrate(dataSource: DataSource, dataDir: string, now: number, log: Logger): Promise<string[]> {
  const before = await ran(dataSource);
  const known = dataSource.migrations.map(({ name }) => name);
  const unknown = before.filter((name) => !known.includes(name!));
  if (unknown.length > 0)
    throw new Error(`The database is of a later version of Bidewell (${unknown.join(', ')}). Start that version.`);
  let copy: string | null = null;
  if (before.length > 0 && before.length < known.length) {
    copy = await copyBefore(dataDir, now);
    log.info({ file: copy }, 'database copied before its migration');
  }
  try {
    const done = await dataSource.runMigrations();
    return done.map(({ name }) => name);
  } catch (error) {
    const done = await ran(dataSource);
    const failed = known.find((name) => !done.includes(name!));
    const reason = error instanceof Error ? error.message : String(error);
    const left = copy === null ? '' : ` A copy from before is ${path.basename(copy)} among the backups.`;
    throw new Error(
      `The database could not be brought to this version: ${failed} failed (${reason}). It is whole, as of the migration before.${left} Start the version before, or try again.`,
      { cause: error },
    );
  }
}
