import Database from 'better-sqlite3';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { backUp } from '@/server/back-up';

let folder: string;
beforeEach(() => (folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-backup-'))));
afterEach(() => fs.rmSync(folder, { recursive: true, force: true }));

const at = new Date('2026-06-09T08:15:30.250Z');

test('a backup made while a writer is at work holds the 1,000 committed rows, and not the row still open', async () => {
  const source = path.join(folder, 'live.sqlite');
  const writer = new Database(source);
  writer.pragma('journal_mode = WAL');
  writer.pragma('wal_autocheckpoint = 0'); // all of it stays in the log, where a plain copy of the file would miss it
  writer.exec('CREATE TABLE charge (id INTEGER PRIMARY KEY, note TEXT)');
  const insert = writer.prepare('INSERT INTO charge (note) VALUES (?)');
  for (let i = 0; i < 1000; i++) insert.run(`reading ${i}`);
  writer.exec('BEGIN IMMEDIATE');
  insert.run('not committed');

  const file = await backUp(source, path.join(folder, 'backups'), at);
  writer.exec('ROLLBACK');
  writer.close();

  expect(path.basename(file)).toBe('bidewell-2026-06-09T08-15-30Z.sqlite');
  const copy = new Database(file, { readonly: true });
  expect(copy.prepare('SELECT count(*) AS n FROM charge').get()).toEqual({ n: 1000 });
  copy.close();
  expect(fs.readdirSync(path.dirname(file))).toEqual([path.basename(file)]);
});

test('the copy can be read by its owner only', async () => {
  const source = path.join(folder, 'live.sqlite');
  new Database(source).exec('CREATE TABLE a (b)').close();
  const file = await backUp(source, folder, at);
  expect(fs.statSync(file).mode & 0o777).toBe(0o600);
});

test('without a database it names the setting to look at and leaves nothing behind', async () => {
  await expect(backUp(path.join(folder, 'none.sqlite'), path.join(folder, 'backups'), at)).rejects.toThrow(
    'BIDEWELL_DATA',
  );
  expect(fs.existsSync(path.join(folder, 'backups'))).toBe(false);
});
