/** Copies of the data folder made by the clock while the server runs. */
import fs from 'node:fs';
import path from 'node:path';
import { Worker } from 'node:worker_threads';
import type { Logger } from 'pino';
import { keysBeside } from '../backup-keys';
import { backupsToRemove, listBackups, type BackupFile } from '../backup-files';
import type { Clock } from '../clock';
import { backupFolder, databaseFile, photoFolder } from '../data-files';

export interface BackUpOrder {
  source: string;
  photos: string;
  folder: string;
  now: number;
  kind: 'clock' | null;
}
export interface BackUpDone {
  file: string;
  bytes: number;
  photos: number;
  newPhotos: number;
  /** Photos that are gone or damaged and are in no copy. */
  missing: string[];
}

/** What the manager sees of the copies. */
export interface BackupState {
  copies: BackupFile[];
  /** The last try that failed after the last that did not; null: none. */
  failed: { at: number; reason: string } | null;
}

export interface Backups {
  /** Makes one now; a second call meanwhile waits for the same. @throws Error where it cannot be made */
  backUpNow(kind: 'clock' | null): Promise<BackUpDone>;
  state(): BackupState;
  /** Makes one whenever the last is older than the interval. */
  start(): void;
  stop(): Promise<void>;
}

/** Whether one is due is looked at this often, ms: the clock may be set, and the machine sleep. */
const LOOK_MS = 60_000;
/** After a try that failed the next comes not before this, ms. */
const TRY_AGAIN_MS = 10 * 60_000;

const workerFile = import.meta.url.endsWith('.js')
  ? new URL('./workers/back-up.js', import.meta.url)
  : new URL('../workers/back-up-from-source.mjs', import.meta.url);

/** @param everyHours hours between two copies; 0: none by the clock */
export function makeBackups(parts: { dataDir: string; everyHours: number; clock: Clock; log: Logger }): Backups {
  const { dataDir, everyHours, clock, log } = parts;
  const folder = backupFolder(dataDir);
  let underWay: Promise<BackUpDone> | null = null;
  let worker: Worker | null = null;
  let timer: NodeJS.Timeout | null = null;
  let failed: BackupState['failed'] = null;

  async function make(kind: 'clock' | null): Promise<BackUpDone> {
    const now = clock.now();
    sweepUnfinished(folder);
    const order = { source: databaseFile(dataDir), photos: photoFolder(dataDir), folder, now, kind };
    try {
      const done = await run(order);
      failed = null;
      const gone = backupsToRemove(listBackups(folder), now);
      for (const { file } of gone) for (const one of [keysBeside(file), file]) fs.rmSync(one, { force: true });
      log.info({ file: done.file, bytes: done.bytes, removed: gone.length }, 'data copied');
      if (done.missing.length > 0) log.error({ files: done.missing }, 'photos that are gone or damaged are in no copy');
      return done;
    } catch (error) {
      failed = { at: now, reason: error instanceof Error ? error.message : String(error) };
      log.error({ err: error }, 'the data was not copied');
      throw error;
    }
  }

  const run = (order: BackUpOrder): Promise<BackUpDone> =>
    new Promise((resolve, reject) => {
      const one = new Worker(workerFile, { workerData: order });
      worker = one;
      one.once('message', resolve);
      one.once('error', reject);
      one.once('exit', () => {
        worker = null;
        // Settled already where it gave its answer.
        reject(new Error('The copy was broken off.'));
      });
    });

  function backUpNow(kind: 'clock' | null): Promise<BackUpDone> {
    underWay ??= make(kind).finally(() => (underWay = null));
    return underWay;
  }

  /** The last copy of any kind counts: one by hand saves the next by the clock. */
  function isDue(now: number): boolean {
    if (failed !== null && now >= failed.at && now < failed.at + TRY_AGAIN_MS) return false;
    const last = listBackups(folder).find(({ at }) => at <= now);
    return last === undefined || now - last.at >= everyHours * 3600_000;
  }

  function look(): void {
    // What failed is in the log and in the state.
    if (isDue(clock.now())) backUpNow('clock').catch(() => undefined);
  }

  return {
    backUpNow,
    state: () => ({ copies: listBackups(folder), failed }),
    start() {
      if (everyHours === 0) return;
      timer = setInterval(look, LOOK_MS);
      timer.unref();
      look();
    },
    async stop() {
      if (timer) clearInterval(timer);
      timer = null;
      await worker?.terminate();
      await underWay?.catch(() => undefined);
    },
  };
}

/** What a crash has left of a copy. */
function sweepUnfinished(folder: string): void {
  if (!fs.existsSync(folder)) return;
  for (const name of fs.readdirSync(folder))
    if (/^bidewell-.*\.unfinished(-journal|-wal|-shm)?$/.test(name))
      fs.rmSync(path.join(folder, name), { force: true });
}
