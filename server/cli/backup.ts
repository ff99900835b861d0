// `npm run backup [-- folder]`: a copy of the database while the server runs, into data/backups or the folder named.
import Database from 'better-sqlite3';
import fs from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { readConfig } from '../config';
import { databaseFile } from '../data-files';

/**
 * Copies a database page by page, what is still in its write-ahead log included, and checks the copy before it gets
 * its name. Writers are not held up.
 * @param source database file
 * @param folder where the copy goes; made when missing
 * @param now instant in the copy's name
 * @returns the copy's path
 * @throws Error when there is no database or the copy does not pass SQLite's integrity check
 */
export async function backUp(source: string, folder: string, now: Date): Promise<string> {
  if (!fs.existsSync(source))
    throw new Error(`There is no database at ${source}. Set BIDEWELL_DATA to the data folder of the server.`);
  fs.mkdirSync(folder, { recursive: true });
  const stamp = now
    .toISOString()
    .replace(/\.\d+Z$/, 'Z')
    .replaceAll(':', '-');
  const file = path.join(folder, `bidewell-${stamp}.sqlite`);
  const unfinished = `${file}.unfinished`;
  const database = new Database(source, { readonly: true, fileMustExist: true });
  try {
    await database.backup(unfinished);
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
  fs.renameSync(unfinished, file);
  return file;
}

async function main(): Promise<void> {
  const { dataDir } = readConfig({ BIDEWELL_DATA: process.env.BIDEWELL_DATA });
  const folder = path.resolve(process.argv[2] ?? path.join(dataDir, 'backups'));
  const file = await backUp(databaseFile(dataDir), folder, new Date());
  const mebibytes = (fs.statSync(file).size / 1024 / 1024).toFixed(1);
  console.log(`bidewell: ${file} (${mebibytes} MiB, checked)`);
  console.log(
    'bidewell: to restore, stop the server, remove bidewell.sqlite, -wal and -shm from the data folder, and put this copy there as bidewell.sqlite',
  );
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  main().catch((error: unknown) => {
    console.error(`bidewell: ${error instanceof Error ? error.message : String(error)}`);
    process.exitCode = 1;
  });
}
