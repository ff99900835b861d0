import Database from 'better-sqlite3';
import { lockFile } from './data-files';

/** Holds a data folder for one process. */
export interface FolderLock {
  release(): void;
}

/**
 * Takes a data folder for this process alone. Two servers on one folder would tell every alert twice and sweep each
 * other's photos.
 *
 * The lock is one of the operating system on a small file of its own, taken through SQLite: it ends with the process,
 * however that ends, so that nothing has to be cleared away after a crash.
 * @throws Error where another process has it, with what to do
 */
export function lockFolder(dataDir: string): FolderLock {
  const database = new Database(lockFile(dataDir), { timeout: 0 });
  try {
    database.exec('BEGIN EXCLUSIVE');
  } catch (error) {
    database.close();
    if ((error as { code?: string }).code !== 'SQLITE_BUSY') throw error;
    throw new Error(
      `Another Bidewell works on ${dataDir}. Stop it first, or set BIDEWELL_DATA to a folder of its own.`,
      { cause: error },
    );
  }
  return { release: () => database.close() };
}
