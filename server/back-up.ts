import Database from 'better-sqlite3';
import fs from 'node:fs';
import path from 'node:path';
import { backUpKeys } from './backup-keys';

/**
 * Copies a database page by page, what is still in its write-ahead log included, and checks the copy before it gets
 * its name. Writers are not held up. The keys of the installation are laid beside it.
 * @param source database file in its data folder
 * @param folder where the copy goes; made when missing
 * @param now instant in the copy's name
 * @param kind 'clock': made by the clock, and so removed by it one day
 * @returns the copy's path
 * @throws Error when there is no database or the copy does not pass SQLite's integrity check
 */
export async function backUp(source: string, folder: string, now: Date, kind?: 'clock'): Promise<string> {
  if (!fs.existsSync(source))
    throw new Error(`There is no database at ${source}. Set BIDEWELL_DATA to the data folder of the server.`);
  fs.mkdirSync(folder, { recursive: true });
  const stamp = now
    .toISOString()
    .replace(/\.\d+Z$/, 'Z')
    .replaceAll(':', '-');
  const file = path.join(folder, `bidewell-${kind ? `${kind}-` : ''}${stamp}.sqlite`);
  const unfinished = `${file}.unfinished`;
  const database = new Database(source, { readonly: true, fileMustExist: true });
  try {
    await database.backup(unfinished);
  } catch (error) {
    // A disk that is full is not made fuller by what nobody can use.
    fs.rmSync(unfinished, { force: true });
    throw error;
  } finally {
    database.close();
  }
  const copy = new Database(unfinished);
  try {
    // One file that needs no log beside it, wherever it is carried.
    copy.pragma('journal_mode = DELETE');
    const verdict = copy.pragma('integrity_check', { simple: true });
    if (verdict !== 'ok') throw new Error(`The copy is damaged (${String(verdict)}) and was left at ${unfinished}.`);
  } finally {
    copy.close();
  }
  fs.chmodSync(unfinished, 0o600);
  // First the keys: a copy that has its name is whole.
  backUpKeys(path.dirname(source), file);
  fs.renameSync(unfinished, file);
  return file;
}
