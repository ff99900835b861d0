import Database from 'better-sqlite3';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import fc from 'fast-check';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { backupsToRemove, listBackups, type BackupFile } from '@/server/backup-files';
import { backupFolder, databaseFile } from '@/server/data-files';
import { makeLog } from '@/server/middleware/request-log';
import { makeBackups, type Backups } from '@/server/services/backups';
import { makeTestClock, testNow, type TestClock } from '@/tests/support/server';

const hour = 3600_000;
const day = 24 * hour;

let folder: string;
let clock: TestClock;
let backups: Backups;
beforeEach(() => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-backups-'));
  clock = makeTestClock();
  backups = makeBackups({ dataDir: folder, everyHours: 1, clock, log: makeLog('silent') });
});
afterEach(async () => {
  vi.useRealTimers();
  await backups.stop();
  fs.rmSync(folder, { recursive: true, force: true });
});

function withRows(count: number) {
  const database = new Database(databaseFile(folder));
  database.exec('CREATE TABLE IF NOT EXISTS note (text TEXT)');
  for (let i = 0; i < count; i += 1) database.prepare('INSERT INTO note VALUES (?)').run(`note ${i}`);
  database.close();
}
const rowsOf = (file: string): number => {
  const database = new Database(file, { readonly: true });
  const { n } = database.prepare('SELECT count(*) AS n FROM note').get() as { n: number };
  database.close();
  return n;
};
const copies = () => listBackups(backupFolder(folder));

test('a copy is made at the start and then whenever the last is an hour old, each with what was there at its instant', async () => {
  withRows(3);
  vi.useFakeTimers({ toFake: ['setInterval', 'clearInterval'] });
  backups.start();
  await vi.waitFor(() => expect(copies()).toHaveLength(1));
  withRows(2);
  clock.advance(59 * 60_000);
  vi.advanceTimersByTime(60_000);
  clock.advance(60_000);
  vi.advanceTimersByTime(60_000);
  await vi.waitFor(() => expect(copies()).toHaveLength(2));
  expect(copies().map(({ at }) => at)).toEqual([testNow + hour, testNow]);
  expect(copies().map(({ file }) => rowsOf(file))).toEqual([5, 3]);
  expect(copies().every(({ byClock }) => byClock)).toBe(true);
});

test('one that fails leaves nothing half made, is named with its reason, and the next that does not clears it', async () => {
  fs.mkdirSync(backupFolder(folder));
  const left = path.join(backupFolder(folder), 'bidewell-clock-2026-06-01T00-00-00Z.sqlite.unfinished');
  fs.writeFileSync(left, 'half');
  await expect(backups.backUpNow('clock')).rejects.toThrow('BIDEWELL_DATA');
  expect(backups.state().failed).toMatchObject({ at: testNow });
  expect(fs.readdirSync(backupFolder(folder))).toEqual([]);
  withRows(1);
  await backups.backUpNow('clock');
  expect(backups.state()).toMatchObject({ failed: null, copies: [{ at: testNow, byClock: true }] });
});

test('two that are asked for at once are one', async () => {
  withRows(1);
  const [one, other] = await Promise.all([backups.backUpNow(null), backups.backUpNow(null)]);
  expect(one.file).toBe(other.file);
  expect(copies()).toHaveLength(1);
});

/** A year of copies every hour, with the removals as they would have come. */
function afterAYear(): BackupFile[] {
  let kept: BackupFile[] = [];
  for (let at = testNow; at <= testNow + 365 * day; at += hour) {
    kept.push({ file: `${at}`, at, bytes: 1, byClock: true });
    const gone = new Set(backupsToRemove(kept, at));
    kept = kept.filter((copy) => !gone.has(copy));
  }
  return kept;
}

test('after a year of hourly copies there are 24 of the last day, 13 of the two weeks before it and 11 of the quarter', () => {
  const now = testNow + 365 * day;
  const kept = afterAYear();
  const within = (from: number, to: number) => kept.filter(({ at }) => now - at >= from && now - at < to).length;
  expect(within(0, day)).toBe(24);
  expect(within(day, 14 * day)).toBe(13);
  expect(within(14 * day, 91 * day)).toBe(11);
  expect(within(91 * day, 1e15)).toBe(0);
});

test('whatever the copies, none by hand is removed, the newest stays, and what stays today was not removed before', () => {
  fc.assert(
    fc.property(
      fc.array(fc.record({ age: fc.integer({ min: 0, max: 200 * 24 }), byClock: fc.boolean() }), { minLength: 1 }),
      (list) => {
        const all = list.map(({ age, byClock }, n) => ({ file: `${n}`, at: testNow - age * hour, bytes: 1, byClock }));
        const gone = backupsToRemove(all, testNow);
        expect(gone.every(({ byClock }) => byClock)).toBe(true);
        const stay = all.filter((copy) => !gone.includes(copy));
        const clockCopies = all.filter(({ byClock }) => byClock);
        if (clockCopies.length > 0)
          expect(stay.some(({ at }) => at === Math.max(...clockCopies.map((copy) => copy.at)))).toBe(true);
        // A second look at the same instant finds nothing more to remove.
        expect(backupsToRemove(stay, testNow)).toEqual([]);
      },
    ),
  );
});
