import Database from 'better-sqlite3';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { databaseFile } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { repairForm } from '@/tests/support/repaired';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let folder: string;
let server: TestServer;
let other: Database.Database;
beforeEach(async () => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-faults-'));
  const dataSource = await makeDataSource(databaseFile(folder)).initialize();
  await dataSource.runMigrations();
  server = await makeTestServer({ config: { dataDir: folder }, deps: { dataSource } });
  // What another process sees: only what is committed.
  other = new Database(databaseFile(folder), { timeout: 0 });
});
afterEach(async () => {
  other.close();
  await server.close();
  await server.deps.dataSource.destroy();
  fs.rmSync(folder, { recursive: true, force: true });
});

let keys = 0;
const book = (note: string | null = null) =>
  server
    .agentFor('technician')
    .post('/api/repairs', { ...repairForm(null), note })
    .set('Idempotency-Key', `book-with-a-fault-${(keys += 1)}`);
const committed = () => (other.prepare('SELECT count(*) AS n FROM repair').get() as { n: number }).n;
const pragma = (text: string) => server.deps.dataSource.query(`PRAGMA ${text}`) as Promise<Record<string, number>[]>;

test('a full disk is a 503 that says so, reads go on, nothing half done stays, and with room again the same write is taken', async () => {
  await book().expect(201);
  const [pages] = await pragma('page_count');
  // As a full disk: SQLite gets no further page.
  await pragma(`max_page_count = ${pages!.page_count}`);
  let refused = await book('x'.repeat(1900));
  for (let n = 0; n < 40 && refused.status === 201; n += 1) refused = await book('x'.repeat(1900));
  expect(refused.status).toBe(503);
  expect(refused.body).toMatchObject({ code: 'disk_full' });
  expect(refused.body.detail).toContain('disk of the server is full');
  expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
  const before = committed();
  const list = await server.agentFor('technician').get('/api/repairs').expect(200);
  expect(list.body.counts.open).toBe(before);
  await book('x'.repeat(1900)).expect(503);
  await pragma('max_page_count = 1073741823');
  await book('x'.repeat(1900)).expect(201);
  expect(committed()).toBe(before + 1);
});

test('while another process holds the write lock a write is a 503, reads go on, and afterwards it is taken', async () => {
  await book().expect(201);
  await pragma('busy_timeout = 50');
  other.exec('BEGIN IMMEDIATE');
  const refused = await book();
  expect(refused.status).toBe(503);
  expect(refused.body).toMatchObject({ code: 'database_busy' });
  await server.agentFor('technician').get('/api/repairs').expect(200);
  other.exec('ROLLBACK');
  await book().expect(201);
  expect(committed()).toBe(2);
});

test('an error in the middle of a write leaves no transaction open: the next is committed for others to see', async () => {
  await server.deps.dataSource.query(
    "CREATE TRIGGER stop BEFORE INSERT ON repair_event BEGIN SELECT RAISE(ROLLBACK, 'gone'); END",
  );
  await book().expect(500);
  await server.deps.dataSource.query('DROP TRIGGER stop');
  expect(committed()).toBe(0);
  await book().expect(201);
  expect(committed()).toBe(1);
});

test('after a full disk, a write that is refused half way takes nothing later with it: the next is committed for others to see', async () => {
  await book().expect(201);
  const [pages] = await pragma('page_count');
  await pragma(`max_page_count = ${pages!.page_count}`);
  for (let n = 0; n < 40; n += 1) await book('x'.repeat(1900));
  await pragma('max_page_count = 1073741823');
  const before = committed();
  await server.deps.dataSource.query(
    "CREATE TRIGGER stop BEFORE INSERT ON repair_event BEGIN SELECT RAISE(ABORT, 'gone'); END",
  );
  await book().expect(500);
  await server.deps.dataSource.query('DROP TRIGGER stop');
  await book().expect(201);
  expect(committed()).toBe(before + 1);
});
