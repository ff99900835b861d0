// `npm run backup [-- folder]`: a copy of the database and its photos while the server runs, into data/backups or the
// folder named.
import fs from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { backUp } from '../back-up';
import { keysBeside } from '../backup-keys';
import { backUpPhotos } from '../back-up-photos';
import { readConfig } from '../config';
import { backupFolder, databaseFile, photoFolder } from '../data-files';

async function main(): Promise<void> {
  const { dataDir } = readConfig({ BIDEWELL_DATA: process.env.BIDEWELL_DATA });
  const folder = path.resolve(process.argv[2] ?? backupFolder(dataDir));
  const file = await backUp(databaseFile(dataDir), folder, new Date());
  const mebibytes = (fs.statSync(file).size / 1024 / 1024).toFixed(1);
  console.log(`bidewell: ${file} (${mebibytes} MiB, checked)`);
  if (fs.existsSync(keysBeside(file)))
    console.log(`bidewell: ${keysBeside(file)} (the keys of this installation: keep them as safe as the data)`);
  const photos = path.join(folder, 'photos');
  const { there, copied, missing } = backUpPhotos(file, photoFolder(dataDir), photos);
  if (there > 0) console.log(`bidewell: ${photos} (${there} photos of that copy, ${copied} of them new)`);
  console.log(`bidewell: to restore, stop the server and run: npm run restore -- ${file}`);
  // Said last, so that it is not missed; the database is copied all the same.
  if (missing.length > 0)
    throw new Error(`These photos are gone or damaged and are in no copy: ${missing.join(', ')}.`);
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  main().catch((error: unknown) => {
    console.error(`bidewell: ${error instanceof Error ? error.message : String(error)}`);
    process.exitCode = 1;
  });
}
