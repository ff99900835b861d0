import fs from 'node:fs/promises';
import path from 'node:path';
import type { DataSource } from 'typeorm';
import { photoFolder } from './data-files';
import { namedPhotoFiles } from './repositories/photos.repository';
import { photoFileOf } from './services/photo-files';

/** A file that is being taken in has no row yet; none takes so long, ms. */
const LEAST_AGE = 3_600_000;

export interface SweptPhotos {
  /** Names of the files that were removed. */
  removed: string[];
  /** The database names none of many files: it is another one than they were taken in with, and nothing was touched. */
  strange: boolean;
}

/**
 * Removes the files of photos that no row names: the server went down between writing a file and its row, or between
 * removing a row and its file. Only what has the name of a photo's file, and never one that is younger than an hour.
 */
export async function sweepPhotos(dataSource: DataSource, dataDir: string, now: number): Promise<SweptPhotos> {
  const folder = photoFolder(dataDir);
  const files = await fs.readdir(folder).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return [];
    throw error;
  });
  const photos = files.flatMap((name) => {
    const file = photoFileOf(name);
    return file === null ? [] : [{ name, file }];
  });
  if (photos.length === 0) return { removed: [], strange: false };
  const named = await namedPhotoFiles(dataSource.manager);
  const unnamed = photos.filter(({ file }) => !named.has(file));
  // A database that was lost and begun anew must not take its photos along.
  if (unnamed.length === photos.length && new Set(photos.map(({ file }) => file)).size > 1)
    return { removed: [], strange: true };
  const removed: string[] = [];
  for (const { name } of unnamed) {
    const at = path.join(folder, name);
    const { mtimeMs } = await fs.stat(at);
    if (now - mtimeMs < LEAST_AGE) continue;
    await fs.rm(at, { force: true });
    removed.push(name);
  }
  return { removed, strange: false };
}
