/** The keys of an installation in its copies: what was signed and subscribed before a restore holds after it. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import Database from 'better-sqlite3';
import request from 'supertest';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { backUp } from '@/server/back-up';
import { keysBeside } from '@/server/backup-keys';
import { listBackups } from '@/server/backup-files';
import { backupFolder, databaseFile } from '@/server/data-files';
import { makeLog } from '@/server/middleware/request-log';
import { restore } from '@/server/restore';
import { makeBackups } from '@/server/services/backups';
import { startServer, type RunningServer } from '@/server/start-server';
import { cookiesOf } from '@/tests/support/cookies';
import { makeTestClock, testConfig } from '@/tests/support/server';
import { firstWorkshop } from '@/tests/support/first-workshop';

const at = new Date('2026-06-09T08:15:30Z');
let root: string;
let running: RunningServer | null = null;
beforeEach(() => (root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-keys-'))));
afterEach(async () => {
  await running?.stop();
  running = null;
  fs.rmSync(root, { recursive: true, force: true });
});

async function start(folder: string): Promise<string> {
  running = await startServer({ ...testConfig, dataDir: folder }, makeLog('silent'));
  return running.address;
}
async function stop(): Promise<void> {
  await running?.stop();
  running = null;
}

/** A workshop with a session, the key a browser subscribes with, and a copy of it elsewhere. */
async function lived(folder: string) {
  const address = await start(folder);
  const created = await request(address).post('/api/workshops').send(firstWorkshop).expect(201);
  const cookie = Object.entries(cookiesOf(created))
    .map(([name, { value }]) => `${name}=${value}`)
    .join('; ');
  const key = (await request(address).get('/api/push-key').set('Cookie', cookie).expect(200)).body.key as string;
  const copy = await backUp(databaseFile(folder), path.join(root, 'elsewhere'), at);
  await stop();
  return { copy, cookie, key };
}

test('restored into a fresh folder on another machine, a session goes on and browsers are pushed to with the key they know', async () => {
  const { copy, cookie, key } = await lived(path.join(root, 'live'));
  expect(fs.statSync(keysBeside(copy)).mode & 0o777).toBe(0o600);
  const fresh = path.join(root, 'fresh');
  expect(await restore(copy, fresh, at)).toMatchObject({ keys: 2, before: null });
  expect(fs.statSync(path.join(fresh, 'push.key')).mode & 0o777).toBe(0o600);
  const address = await start(fresh);
  const session = await request(address).get('/api/session').set('Cookie', cookie).expect(200);
  expect(session.body.person.email).toBe(firstWorkshop.email);
  expect((await request(address).get('/api/push-key').set('Cookie', cookie)).body.key).toBe(key);
});

test('over a folder with other keys those of the copy are taken, and the others lie beside what was there before', async () => {
  const { copy, key } = await lived(path.join(root, 'live'));
  const other = path.join(root, 'other');
  await start(other);
  await stop();
  const theirs = fs.readFileSync(path.join(other, 'push.key'), 'utf8');
  const { before } = await restore(copy, other, at);
  expect(fs.readFileSync(path.join(other, 'push.key'), 'utf8')).toContain(key);
  expect(JSON.parse(fs.readFileSync(keysBeside(before!), 'utf8'))['push.key']).toBe(theirs);
});

test('a copy without keys leaves those of the folder, and one with damaged keys is refused before anything is touched', async () => {
  const folder = path.join(root, 'live');
  const { copy } = await lived(folder);
  const own = fs.readFileSync(path.join(folder, 'secret.key'), 'utf8');
  fs.writeFileSync(keysBeside(copy), '{"secret.key": 7}');
  await expect(restore(copy, folder, at)).rejects.toThrow('is damaged. Move it away to restore without it');
  expect(fs.existsSync(backupFolder(folder))).toBe(false);
  fs.rmSync(keysBeside(copy));
  expect(await restore(copy, folder, at)).toMatchObject({ keys: 0 });
  expect(fs.readFileSync(path.join(folder, 'secret.key'), 'utf8')).toBe(own);
});

test('a file of keys that names others puts none of them anywhere', async () => {
  const { copy } = await lived(path.join(root, 'live'));
  const keys = JSON.parse(fs.readFileSync(keysBeside(copy), 'utf8')) as Record<string, string>;
  fs.writeFileSync(keysBeside(copy), JSON.stringify({ ...keys, '../outside.key': 'x', 'tls-key.pem': 'x' }));
  const fresh = path.join(root, 'fresh');
  expect(await restore(copy, fresh, at)).toMatchObject({ keys: 2 });
  expect(fs.readdirSync(root).sort()).toEqual(['elsewhere', 'fresh', 'live']);
  expect(fs.readdirSync(fresh)).not.toContain('tls-key.pem');
});

test('a copy that the clock removes takes its keys along', async () => {
  const folder = path.join(root, 'live');
  fs.mkdirSync(folder);
  new Database(databaseFile(folder)).exec('CREATE TABLE note (text TEXT)').close();
  fs.writeFileSync(path.join(folder, 'secret.key'), 'a secret');
  const clock = makeTestClock();
  const backups = makeBackups({ dataDir: folder, everyHours: 1, clock, log: makeLog('silent') });
  await backups.backUpNow('clock');
  clock.advance(200 * 24 * 3600_000);
  await backups.backUpNow('clock');
  const [only, ...others] = listBackups(backupFolder(folder));
  expect(others).toEqual([]);
  const keyFiles = fs.readdirSync(backupFolder(folder)).filter((name) => name.endsWith('.keys'));
  expect(keyFiles).toEqual([path.basename(keysBeside(only!.file))]);
});
