/** A migration that gives up half way, over a database that is filled. */
import Database from 'better-sqlite3';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { DataSource, type MigrationInterface, type QueryRunner } from 'typeorm';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { listBackups } from '@/server/backup-files';
import { backupFolder, databaseFile } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { makeLog } from '@/server/middleware/request-log';
import { migrate } from '@/server/migrate';
import { migrations } from '@/server/migrations/all';
import { startServer } from '@/server/start-server';
import { testConfig } from '@/tests/support/server';
import { makeBench, running } from '../charges/bench';

let folder: string;
const log = makeLog('silent');

beforeEach(async () => {
  // TypeORM says by itself that a migration has failed.
  vi.spyOn(console, 'log').mockImplementation(() => {});
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-failing-'));
  const bench = await makeBench();
  await running(bench, { spareId: await bench.spare('S-1') });
  await bench.server.deps.dataSource.query(`VACUUM INTO '${databaseFile(folder)}'`);
  await bench.server.close();
});
afterEach(() => {
  vi.restoreAllMocks();
  fs.rmSync(folder, { recursive: true, force: true });
});

class Whole9999999999998 implements MigrationInterface {
  readonly name = 'Whole9999999999998';
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE spare ADD COLUMN colour varchar');
  }
  async down(): Promise<void> {}
}

/** Changes rows, adds a table, builds another anew, and then asks for what is not there. */
class HalfWay9999999999999 implements MigrationInterface {
  readonly name = 'HalfWay9999999999999';
  async up(runner: QueryRunner): Promise<void> {
    await runner.query("UPDATE spare SET label = 'gone'");
    await runner.query('CREATE TABLE later (id varchar PRIMARY KEY)');
    await runner.dropColumn('alert', 'check_first');
    await runner.query('UPDATE spare SET weight_kg = 1');
  }
  async down(): Promise<void> {}
}

const later = () =>
  new DataSource({
    ...makeDataSource(databaseFile(folder)).options,
    migrations: [...migrations, Whole9999999999998, HalfWay9999999999999],
  }).initialize();

/** One start of a later version: its migrations, and the end of the process when they fail. */
async function tried(now: number): Promise<string> {
  const dataSource = await later();
  try {
    return await migrate(dataSource, folder, now, log).then(
      () => 'done',
      (error: unknown) => (error as Error).message,
    );
  } finally {
    await dataSource.destroy();
  }
}

function looked() {
  const database = new Database(databaseFile(folder), { readonly: true });
  const all = (sql: string) => database.prepare(sql).all() as Record<string, unknown>[];
  try {
    return {
      schema: all('SELECT name, sql FROM sqlite_master ORDER BY name'),
      rows: [all('SELECT * FROM spare'), all('SELECT * FROM charge'), all('SELECT * FROM alert')],
      ran: all('SELECT name FROM migrations ORDER BY id').map(({ name }) => name),
      sound: [database.pragma('integrity_check', { simple: true }), all('PRAGMA foreign_key_check')],
    };
  } finally {
    database.close();
  }
}

test('leaves nothing behind, keeps the one before it, and says which failed, why, and where the copy is', async () => {
  const now = Date.parse('2026-06-10T06:00:00Z');
  const told = await tried(now);
  expect(told).toContain('HalfWay9999999999999 failed');
  expect(told).toContain('no such column: weight_kg');
  const [copy] = listBackups(backupFolder(folder));
  expect(told).toContain(path.basename(copy!.file));
  const after = looked();
  expect(after.ran.at(-1)).toBe('Whole9999999999998');
  expect(after.sound).toEqual(['ok', []]);
  expect(after.rows[0]).toMatchObject([{ label: 'S-1', colour: null }]);
  expect(after.schema.map(({ name }) => name)).not.toContain('later');
  expect(after.schema.find(({ name }) => name === 'alert')!.sql).toContain('check_first');
  // The copy is of before them both, and this version starts from it.
  fs.rmSync(`${databaseFile(folder)}-wal`, { force: true });
  fs.copyFileSync(copy!.file, databaseFile(folder));
  const server = await startServer({ ...testConfig, dataDir: folder }, log);
  expect((await fetch(`${server.address}/readyz`)).status).toBe(200);
  await server.stop();
});

test('started again 20 times by whoever watches it changes nothing more and adds one copy at most', async () => {
  const first = Date.parse('2026-06-10T06:00:00Z');
  await tried(first);
  const after = looked();
  for (let start = 1; start <= 20; start += 1) {
    expect(await tried(first + start * 5000)).toContain('HalfWay9999999999999 failed');
    expect(looked()).toEqual(after);
  }
  // One of before both migrations, one of between them.
  expect(listBackups(backupFolder(folder))).toHaveLength(2);
});
