/** The keys that an installation has made for itself, in a copy of its data: pushes switched on once go on after a restore. */
import fs from 'node:fs';
import path from 'node:path';
import { pushKeyFile, secretFile } from './data-files';

/** What is kept of a data folder beside its database, by its name there. */
const keyFiles = (dataDir: string): string[] => [secretFile(dataDir), pushKeyFile(dataDir)];

/** The file of the keys that belongs to a copy of the database. */
export const keysBeside = (copy: string): string => `${copy.replace(/\.sqlite$/, '')}.keys`;

/**
 * Lays the keys of a data folder beside a copy of its database, readable to its owner alone. A folder without keys, as of
 * a database that no server has opened yet, gives none.
 * @param copy path that the copy of the database has or will have
 */
export function backUpKeys(dataDir: string, copy: string): void {
  const there = keyFiles(dataDir).filter((file) => fs.existsSync(file));
  if (there.length === 0) return;
  const keys = Object.fromEntries(there.map((file) => [path.basename(file), fs.readFileSync(file, 'utf8')]));
  writeOwn(keysBeside(copy), `${JSON.stringify(keys)}\n`);
}

/** Writes a file that only its owner reads, aside first: it is there whole or not at all. */
function writeOwn(file: string, text: string): void {
  const unfinished = `${file}.unfinished`;
  fs.writeFileSync(unfinished, text, { mode: 0o600 });
  // One that was left there keeps the mode it had.
  fs.chmodSync(unfinished, 0o600);
  fs.renameSync(unfinished, file);
}

/**
 * The keys that lie beside a copy, by the name of their file; null: none do, as beside copies of earlier versions.
 * @throws Error where they are damaged
 */
export function keysOf(copy: string): Record<string, string> | null {
  const file = keysBeside(copy);
  if (!fs.existsSync(file)) return null;
  try {
    const keys = JSON.parse(fs.readFileSync(file, 'utf8')) as Record<string, unknown>;
    const entries = Object.entries(keys);
    if (entries.length === 0 || entries.some(([, text]) => typeof text !== 'string')) throw new Error('no keys');
    return keys as Record<string, string>;
  } catch (error) {
    throw new Error(
      `${file} is damaged. Move it away to restore without it: everybody then signs in again and switches pushes to browsers on anew.`,
      { cause: error },
    );
  }
}

/** Puts keys into a data folder; only those that a server knows, whatever else the file names. */
export function bringKeys(keys: Record<string, string>, dataDir: string): number {
  const known = keyFiles(dataDir).flatMap((file) => {
    const text = keys[path.basename(file)];
    return text === undefined ? [] : [{ file, text }];
  });
  for (const { file, text } of known) writeOwn(file, text);
  return known.length;
}
