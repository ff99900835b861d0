/** Which copies lie in the folder of backups, and which of those made by the clock are still worth their room. */
import fs from 'node:fs';
import path from 'node:path';

export interface BackupFile {
  file: string;
  /** Epoch ms, from its name. */
  at: number;
  bytes: number;
  /** Made by the clock; those by hand and before a migration are never removed. */
  byClock: boolean;
}

const pattern = /^bidewell-(clock-)?(\d{4}-\d\d-\d\d)T(\d\d)-(\d\d)-(\d\d)Z\.sqlite$/;

/** The copies in a folder, newest first; none where there is no folder. */
export function listBackups(folder: string): BackupFile[] {
  if (!fs.existsSync(folder)) return [];
  return fs
    .readdirSync(folder)
    .flatMap((name): BackupFile[] => {
      const match = pattern.exec(name);
      if (!match) return [];
      const [, byClock, day, hour, minute, second] = match;
      const file = path.join(folder, name);
      const at = Date.parse(`${day}T${hour}:${minute}:${second}Z`);
      return [{ file, at, bytes: fs.statSync(file).size, byClock: byClock !== undefined }];
    })
    .sort((one, other) => other.at - one.at);
}

const CHUNK_BYTES = 1 << 20;

/** Whether two files are the same, byte for byte. Read piece by piece: a database may be larger than the memory. */
export function holdTheSame(one: string, other: string): boolean {
  if (fs.statSync(one).size !== fs.statSync(other).size) return false;
  const files = [fs.openSync(one, 'r'), fs.openSync(other, 'r')];
  const [left, right] = [Buffer.alloc(CHUNK_BYTES), Buffer.alloc(CHUNK_BYTES)];
  try {
    for (;;) {
      const read = fs.readSync(files[0]!, left, 0, CHUNK_BYTES, null);
      const alike = fs.readSync(files[1]!, right, 0, CHUNK_BYTES, null) === read;
      if (!alike || !left.subarray(0, read).equals(right.subarray(0, read))) return false;
      if (read === 0) return true;
    }
  } finally {
    for (const file of files) fs.closeSync(file);
  }
}

const HOUR = 3600_000;
const DAY = 24 * HOUR;
/** Every copy for a day, then one a day for two weeks, then one a week for a quarter of a year. A setting of ours. */
const generations = [
  { youngerThan: DAY, apart: 0 },
  { youngerThan: 14 * DAY, apart: DAY },
  { youngerThan: 91 * DAY, apart: 7 * DAY },
];

/**
 * The copies made by the clock that are to be removed at `now`. Of each day or week (UTC) its first copy stays, so that
 * a copy kept today is the one that is kept tomorrow.
 */
export function backupsToRemove(copies: readonly BackupFile[], now: number): BackupFile[] {
  const kept = new Set<number>();
  const oldestFirst = copies.filter(({ byClock }) => byClock).sort((one, other) => one.at - other.at);
  const newest = oldestFirst.at(-1);
  return oldestFirst.filter((copy) => {
    // Also where the server was off for a year: something to restore is left.
    if (copy === newest) return false;
    const generation = generations.find(({ youngerThan }) => now - copy.at < youngerThan);
    if (!generation) return true;
    if (generation.apart === 0) return false;
    const slot = generation.apart * 1e6 + Math.floor(copy.at / generation.apart);
    if (kept.has(slot)) return true;
    kept.add(slot);
    return false;
  });
}
