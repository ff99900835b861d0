import Database from 'better-sqlite3';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

export interface PhotosBackUp {
  /** Photos that the copied database names and that lie in the backup now. */
  there: number;
  /** Of these, copied this time: a photo never changes, so one that was copied before is left as it is. */
  copied: number;
  /** Names of those whose file is gone or damaged. */
  missing: string[];
}

interface Row {
  file: string;
  sha256: string;
}

function photosOf(databaseCopy: string): Row[] {
  const database = new Database(databaseCopy, { readonly: true, fileMustExist: true });
  try {
    const known = database.prepare("SELECT 1 FROM sqlite_master WHERE type = 'table' AND name = 'photo'").get();
    // A copy that was made before there were photos.
    return known ? (database.prepare('SELECT file, sha256 FROM photo ORDER BY file').all() as Row[]) : [];
  } finally {
    database.close();
  }
}

const sha256Of = (file: string): string => createHash('sha256').update(fs.readFileSync(file)).digest('hex');

/** Under another name first: a copy that broke off never looks like a photo. */
function copy(from: string, to: string): void {
  const unfinished = `${to}.unfinished`;
  fs.copyFileSync(from, unfinished);
  fs.chmodSync(unfinished, 0o600);
  fs.renameSync(unfinished, to);
}

/**
 * Lays the photos that a copied database names beside it. All copies in a folder share one folder of photos: what an
 * older copy names stays, though it was removed since.
 * @param databaseCopy the copy that `backUp` has made
 * @param source folder of the photos of the running server
 * @param target folder they go to; made when there is one
 */
export function backUpPhotos(databaseCopy: string, source: string, target: string): PhotosBackUp {
  const rows = photosOf(databaseCopy);
  const result: PhotosBackUp = { there: 0, copied: 0, missing: [] };
  if (rows.length > 0) fs.mkdirSync(target, { recursive: true, mode: 0o700 });
  for (const { file, sha256 } of rows) {
    const picture = `${file}.jpg`;
    const kept = path.join(target, picture);
    if (!fs.existsSync(kept) || sha256Of(kept) !== sha256) {
      const from = path.join(source, picture);
      if (!fs.existsSync(from) || sha256Of(from) !== sha256) {
        result.missing.push(picture);
        continue;
      }
      copy(from, kept);
      result.copied += 1;
    }
    const thumbnail = `${file}.thumb.jpg`;
    const small = path.join(source, thumbnail);
    if (!fs.existsSync(path.join(target, thumbnail)) && fs.existsSync(small)) copy(small, path.join(target, thumbnail));
    result.there += 1;
  }
  return result;
}
