import Database from 'better-sqlite3';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { backUp } from './back-up';
import { bringKeys, keysOf } from './backup-keys';
import { backupFolder, databaseFile, photoFolder, prepareDataFolder } from './data-files';
import { lockFolder } from './folder-lock';
import { migrations } from './migrations/all';

export interface Restored {
  file: string;
  /** Copy of what was in the data folder before; null: nothing was. */
  before: string | null;
  photos: number;
  /** Keys of the installation that came with the copy; 0: those of the folder stay. */
  keys: number;
  /** Photos that the copy names and that are neither in the backup nor in the data folder. */
  missing: string[];
}

interface PhotoRow {
  file: string;
  sha256: string;
}

/**
 * Brings a copy back into a data folder: the copy is checked, what is there now is copied into the backups, then the
 * database is exchanged in one step, and the keys and photos that belong to it are laid beside it. Until that step
 * nothing is changed.
 * @param copy file made by a backup, with its `.keys` and its `photos` beside it
 * @param now instant in the name of the copy of what is there now
 * @throws Error where a server works on the folder, or the copy is damaged or of a later version
 */
export async function restore(copy: string, dataDir: string, now: Date): Promise<Restored> {
  if (!fs.existsSync(copy)) throw new Error(`There is no copy at ${copy}.`);
  prepareDataFolder(dataDir);
  const lock = lockFolder(dataDir);
  try {
    const rows = photosOf(copy);
    const keys = keysOf(copy);
    const target = databaseFile(dataDir);
    const fresh = `${target}.restored`;
    fs.copyFileSync(copy, fresh);
    fs.chmodSync(fresh, 0o600);
    const before = fs.existsSync(target) ? await backUp(target, backupFolder(dataDir), now) : null;
    // Of the database that goes: with the new one they would be taken for its own.
    for (const suffix of ['-wal', '-shm']) fs.rmSync(`${target}${suffix}`, { force: true });
    fs.renameSync(fresh, target);
    // The copy knows browsers that have subscribed with these: with others no push would reach them.
    const brought = keys === null ? 0 : bringKeys(keys, dataDir);
    const missing = bringPhotos(rows, path.join(path.dirname(copy), 'photos'), photoFolder(dataDir));
    return { file: target, before, photos: rows.length - missing.length, keys: brought, missing };
  } finally {
    lock.release();
  }
}

/** Checks the copy and reads which photos it names. */
function photosOf(copy: string): PhotoRow[] {
  let database: Database.Database;
  try {
    database = new Database(copy, { readonly: true, fileMustExist: true });
  } catch (error) {
    throw new Error(`${copy} cannot be read.`, { cause: error });
  }
  try {
    const verdict = database.pragma('integrity_check', { simple: true });
    if (verdict !== 'ok') throw new Error(`it is damaged (${String(verdict)})`);
    const has = (table: string) =>
      database.prepare("SELECT 1 FROM sqlite_master WHERE type = 'table' AND name = ?").get(table) !== undefined;
    if (!has('migrations')) throw new Error('it is no database of Bidewell');
    const known = new Set<string>(migrations.map((migration) => new migration().name));
    const ran = database.prepare('SELECT name FROM migrations').all() as { name: string }[];
    const later = ran.filter(({ name }) => !known.has(name)).map(({ name }) => name);
    if (later.length > 0) throw new Error(`it is of a later version (${later.join(', ')})`);
    return has('photo') ? (database.prepare('SELECT file, sha256 FROM photo ORDER BY file').all() as PhotoRow[]) : [];
  } catch (error) {
    throw new Error(`${copy} cannot be restored: ${error instanceof Error ? error.message : String(error)}.`, {
      cause: error,
    });
  } finally {
    database.close();
  }
}

const isWhole = (file: string, sha256: string): boolean =>
  fs.existsSync(file) && createHash('sha256').update(fs.readFileSync(file)).digest('hex') === sha256;

function bringPhotos(rows: readonly PhotoRow[], from: string, to: string): string[] {
  const missing: string[] = [];
  if (rows.length > 0) fs.mkdirSync(to, { recursive: true, mode: 0o700 });
  for (const { file, sha256 } of rows) {
    const picture = `${file}.jpg`;
    if (!isWhole(path.join(to, picture), sha256)) {
      if (!isWhole(path.join(from, picture), sha256)) {
        missing.push(picture);
        continue;
      }
      bring(path.join(from, picture), path.join(to, picture));
    }
    const small = `${file}.thumb.jpg`;
    if (!fs.existsSync(path.join(to, small)) && fs.existsSync(path.join(from, small)))
      bring(path.join(from, small), path.join(to, small));
  }
  return missing;
}

function bring(from: string, to: string): void {
  fs.copyFileSync(from, `${to}.unfinished`);
  fs.chmodSync(`${to}.unfinished`, 0o600);
  fs.renameSync(`${to}.unfinished`, to);
}
