import fs from 'node:fs';
import path from 'node:path';

/** Everything an installation keeps lies in one folder, which only its owner can read. */
export function prepareDataFolder(dataDir: string): void {
  fs.mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  fs.chmodSync(dataDir, 0o700);
}

/** Where the database lies within the data folder. */
export const databaseFile = (dataDir: string): string => path.join(dataDir, 'bidewell.sqlite');
/** What sessions and devices are known by. */
export const secretFile = (dataDir: string): string => path.join(dataDir, 'secret.key');
/** What push services of browsers know the server by. */
export const pushKeyFile = (dataDir: string): string => path.join(dataDir, 'push.key');
/** Where the photos of repairs lie. */
export const photoFolder = (dataDir: string): string => path.join(dataDir, 'photos');
/** Where copies of it go unless somebody says otherwise. */
export const backupFolder = (dataDir: string): string => path.join(dataDir, 'backups');
/** Held by the server that works on the folder. */
export const lockFile = (dataDir: string): string => path.join(dataDir, 'server.lock');
