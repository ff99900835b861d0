import Database from 'better-sqlite3';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { backUp } from '@/server/back-up';
import { backUpPhotos } from '@/server/back-up-photos';
import { backupFolder, databaseFile, photoFolder } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { lockFolder } from '@/server/folder-lock';
import { restore } from '@/server/restore';
import { repairForm } from '@/tests/support/repaired';
import { twoHalves } from '@/tests/support/pictures';
import { makeTestServer } from '@/tests/support/server';

let root: string;
beforeEach(() => (root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-restore-'))));
afterEach(() => fs.rmSync(root, { recursive: true, force: true }));
const at = new Date('2026-06-09T08:15:30Z');

/** A workshop with a repair and a photo in a folder, and a copy of it elsewhere. */
async function copied() {
  const folder = path.join(root, 'live');
  fs.mkdirSync(folder);
  const dataSource = await makeDataSource(databaseFile(folder)).initialize();
  await dataSource.runMigrations();
  const server = await makeTestServer({ config: { dataDir: folder }, deps: { dataSource } });
  const technician = server.agentFor('technician');
  const booked = await technician.post('/api/repairs', repairForm(null)).set('Idempotency-Key', 'book-to-restore');
  await technician
    .upload(`/api/repairs/${booked.body.id}/photos`, 'photo', await twoHalves(40, 20).jpeg().toBuffer(), 'a.jpg')
    .set('Idempotency-Key', 'a-photo-to-restore')
    .expect(201);
  const elsewhere = path.join(root, 'elsewhere');
  const copy = await backUp(databaseFile(folder), elsewhere, at);
  backUpPhotos(copy, photoFolder(folder), path.join(elsewhere, 'photos'));
  await dataSource.destroy();
  await server.deps.dataSource.destroy().catch(() => {});
  return { folder, copy, elsewhere };
}

/** Every row of every table, and every photo's bytes. */
function everything(folder: string): Record<string, unknown> {
  const database = new Database(databaseFile(folder), { readonly: true });
  const tables = database
    .prepare("SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%' ORDER BY name")
    .all() as { name: string }[];
  const rows = Object.fromEntries(tables.map(({ name }) => [name, database.prepare(`SELECT * FROM "${name}"`).all()]));
  database.close();
  const photos = fs.readdirSync(photoFolder(folder)).sort();
  return { rows, photos: photos.map((name) => [name, fs.readFileSync(path.join(photoFolder(folder), name), 'hex')]) };
}

test('restored into a fresh folder, every row of every table and every photo are as they were', async () => {
  const { folder, copy } = await copied();
  const fresh = path.join(root, 'fresh');
  const done = await restore(copy, fresh, at);
  expect(done).toEqual({ file: databaseFile(fresh), before: null, photos: 1, keys: 0, missing: [] });
  const before = everything(folder);
  expect(Object.keys(before.rows as object).length).toBeGreaterThan(30);
  expect(everything(fresh)).toEqual(before);
  expect(fs.statSync(databaseFile(fresh)).mode & 0o777).toBe(0o600);
});

test('over a folder that holds something, what was there is copied into the backups first, its log included', async () => {
  const { copy, folder } = await copied();
  const writer = new Database(databaseFile(folder));
  writer.pragma('journal_mode = WAL');
  writer.pragma('wal_autocheckpoint = 0');
  writer.exec("UPDATE workshop SET name = 'Renamed since'");
  const log = fs.readFileSync(`${databaseFile(folder)}-wal`);
  writer.close();
  // As after a crash: the log is still there.
  fs.writeFileSync(`${databaseFile(folder)}-wal`, log);
  const { before } = await restore(copy, folder, at);
  const names = (file: string) => {
    const database = new Database(file, { readonly: true });
    const rows = database.prepare('SELECT DISTINCT name FROM workshop').all() as { name: string }[];
    database.close();
    return rows.map(({ name }) => name);
  };
  expect(path.dirname(before!)).toBe(backupFolder(folder));
  expect(names(before!)).toEqual(['Renamed since']);
  expect(names(databaseFile(folder))).not.toContain('Renamed since');
});

test('while a server works on the folder it is refused, and nothing is changed', async () => {
  const { copy, folder } = await copied();
  const bytes = fs.readFileSync(databaseFile(folder));
  const lock = lockFolder(folder);
  await expect(restore(copy, folder, at)).rejects.toThrow('Another Bidewell works on');
  lock.release();
  expect(fs.readFileSync(databaseFile(folder)).equals(bytes)).toBe(true);
});

test.each([
  ['damaged', (file: string) => fs.writeFileSync(file, Buffer.alloc(20_000, 7)), 'cannot be restored'],
  [
    'of a later version',
    (file: string) => {
      const database = new Database(file);
      database.exec("INSERT INTO migrations (timestamp, name) VALUES (9e12, 'Later9000000000000')");
      database.close();
    },
    'later version (Later9000000000000)',
  ],
  [
    'something else',
    (file: string) => {
      fs.rmSync(file);
      new Database(file).exec('CREATE TABLE a (b)').close();
    },
    'no database of Bidewell',
  ],
])('a copy that is %s is refused before anything is touched', async (_what, spoil, words) => {
  const { copy, folder } = await copied();
  const bytes = fs.readFileSync(databaseFile(folder));
  spoil(copy);
  await expect(restore(copy, folder, at)).rejects.toThrow(words);
  expect(fs.readFileSync(databaseFile(folder)).equals(bytes)).toBe(true);
  expect(fs.existsSync(backupFolder(folder))).toBe(false);
});

test('a photo that lies nowhere is named, and the rest is restored', async () => {
  const { copy, elsewhere } = await copied();
  const [photo] = fs.readdirSync(path.join(elsewhere, 'photos')).filter((name) => !name.includes('thumb'));
  fs.writeFileSync(path.join(elsewhere, 'photos', photo!), 'no picture');
  const done = await restore(copy, path.join(root, 'fresh'), at);
  expect(done).toMatchObject({ photos: 0, missing: [photo] });
});
