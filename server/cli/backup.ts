// `npm run backup [-- folder]`: a copy of the database while the server runs, into data/backups or the folder named.
import fs from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { backUp } from '../back-up';
import { readConfig } from '../config';
import { backupFolder, databaseFile } from '../data-files';

async function main(): Promise<void> {
  const { dataDir } = readConfig({ BIDEWELL_DATA: process.env.BIDEWELL_DATA });
  const folder = path.resolve(process.argv[2] ?? backupFolder(dataDir));
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
