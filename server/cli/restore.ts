// `npm run restore [-- copy]`: brings a copy back into the data folder; without a name the newest in data/backups.
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { listBackups } from '../backup-files';
import { readConfig } from '../config';
import { backupFolder } from '../data-files';
import { restore } from '../restore';

async function main(): Promise<void> {
  const { dataDir } = readConfig({ BIDEWELL_DATA: process.env.BIDEWELL_DATA });
  const named = process.argv[2];
  const copy = named ? path.resolve(named) : listBackups(backupFolder(dataDir))[0]?.file;
  if (!copy) throw new Error(`There is no copy in ${backupFolder(dataDir)}. Name one: npm run restore -- <file>`);
  const { file, before, photos, keys, missing } = await restore(copy, dataDir, new Date());
  console.log(`bidewell: ${file} is ${copy}`);
  if (before !== null) console.log(`bidewell: what was there before is ${before}`);
  if (photos > 0) console.log(`bidewell: ${photos} photos lie beside it`);
  console.log(
    keys > 0
      ? 'bidewell: the keys of that copy are back: pushes to browsers that it knows go on'
      : 'bidewell: that copy has no keys beside it; where the folder had none either, everybody signs in again and switches pushes to browsers on anew',
  );
  console.log('bidewell: start the server now; everybody whose session is younger than the copy signs in again');
  if (missing.length > 0) throw new Error(`These photos are in no copy: ${missing.join(', ')}.`);
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  main().catch((error: unknown) => {
    console.error(`bidewell: ${error instanceof Error ? error.message : String(error)}`);
    process.exitCode = 1;
  });
}
