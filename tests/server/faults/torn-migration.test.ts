/** A filled database of the first version on its way to this one, with the process killed between any two statements. */
import Database from 'better-sqlite3';
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { DataSource } from 'typeorm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { seededRandom } from '@/calc/index';
import { listBackups } from '@/server/backup-files';
import { backupFolder, databaseFile } from '@/server/data-files';
import { makeDataSource } from '@/server/data-source';
import { migrations } from '@/server/migrations/all';
import { bundleServer } from '@/server/cli/bundle.mjs';
import { hour, kept, makeBench, minute, running } from '../charges/bench';

const bundle = path.join(process.cwd(), 'node_modules/.cache/bidewell-torn-test');
const root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-torn-'));
const oldFile = path.join(root, 'old.sqlite');

beforeAll(async () => {
  await bundleServer(bundle, { 'die-at-statement': 'tests/server/faults/die-at-statement.ts' });
  const bench = await makeBench();
  try {
    const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' });
    await kept(bench, { spareId: await bench.spare('S-2'), repairRef: 'R-2' }, { channel: 'B1' });
    for (let n = 3; n < 60; n += 1) await bench.spare(`S-${n}`);
    bench.server.clock.advance(5 * minute);
    const reading = bench.as('technician').post(`/api/charges/${charge.id}/readings`, { amps: '10' });
    await reading.set('Idempotency-Key', 'a-reading-to-keep').expect(200);
    await bench.live(hour + 30 * minute, 10 * minute);
    const { dataSource } = bench.server.deps;
    for (const _one of migrations.slice(1)) await dataSource.undoLastMigration();
    await dataSource.query(`VACUUM INTO '${oldFile}'`);
  } finally {
    await bench.server.close();
  }
}, 120_000);
afterAll(() => {
  fs.rmSync(bundle, { recursive: true, force: true });
  fs.rmSync(root, { recursive: true, force: true });
});

interface Snapshot {
  ran: string[];
  schema: unknown[];
  rows: Record<string, unknown[]>;
  sound: boolean;
}

/** Tables and columns of the old version: nothing in them may change on the way. */
let columns: Record<string, string[]> | null = null;

/** What a database holds, read from a copy of its files, so that looking at it repairs nothing. */
function snapshotOf(file: string): Snapshot {
  const copy = path.join(fs.mkdtempSync(path.join(root, 'look-')), 'database.sqlite');
  fs.copyFileSync(file, copy);
  if (fs.existsSync(`${file}-wal`)) fs.copyFileSync(`${file}-wal`, `${copy}-wal`);
  const database = new Database(copy);
  const all = (sql: string) => database.prepare(sql).all() as Record<string, unknown>[];
  try {
    const schema = all("SELECT type, name, tbl_name, sql FROM sqlite_master WHERE name NOT LIKE 'sqlite_%'");
    const own: Record<string, string[]> = (columns ??= Object.fromEntries(
      schema
        .filter(({ type, name }) => type === 'table' && name !== 'migrations')
        .map(({ name }) => [
          name,
          all(`SELECT name FROM pragma_table_info('${String(name)}')`).map((column) => String(column.name)),
        ]),
    ));
    return {
      ran: all('SELECT name FROM migrations ORDER BY id').map(({ name }) => String(name)),
      schema: schema.sort((one, other) => (String(one.name) < String(other.name) ? -1 : 1)),
      rows: Object.fromEntries(
        Object.entries(own).map(([table, names]) => [
          table,
          all(`SELECT ${names.join(', ')} FROM ${table} ORDER BY 1`),
        ]),
      ),
      sound:
        database.pragma('integrity_check', { simple: true }) === 'ok' && all('PRAGMA foreign_key_check').length === 0,
    };
  } finally {
    database.close();
  }
}

/** A data folder with the old database in it. */
function oldFolder(name: string): string {
  const folder = path.join(root, name);
  fs.mkdirSync(folder);
  fs.copyFileSync(oldFile, databaseFile(folder));
  return folder;
}

/** Really starts the server. @returns the statement that it died before; null: it got ready, and was stopped */
function start(folder: string, dieAt: number): Promise<string | null> {
  return new Promise((resolve, reject) => {
    const main = ['--import', path.join(bundle, 'die-at-statement.js'), path.join(bundle, 'main.js')];
    const child = spawn(process.execPath, main, {
      env: {
        ...process.env,
        PORT: '0',
        BIDEWELL_HOST: '127.0.0.1',
        BIDEWELL_DATA: folder,
        BIDEWELL_DEMO: 'off',
        BIDEWELL_BACKUP_HOURS: '0',
        BIDEWELL_LOG: 'warn',
        DIE_AT_STATEMENT: String(dieAt),
      },
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    });
    let output = '';
    for (const stream of [child.stdout, child.stderr])
      stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
    child.on('message', () => child.kill('SIGTERM'));
    child.on('error', reject);
    child.on('close', (status, signal) => {
      const died = /died before: (.*)/.exec(output)?.[1];
      if (signal === 'SIGKILL' && died !== undefined) resolve(died);
      else if (status === 0) resolve(null);
      else reject(new Error(`The server ended with ${status ?? signal}: ${output}`));
    });
  });
}

/** The schema after each number of migrations, by a run that nothing disturbs. */
async function schemasOnTheWay(): Promise<Map<number, unknown[]>> {
  const file = databaseFile(oldFolder('undisturbed'));
  const schemas = new Map<number, unknown[]>();
  for (let count = 1; count <= migrations.length; count += 1) {
    const options = { ...makeDataSource(file).options, migrations: migrations.slice(0, count) };
    const dataSource = await new DataSource(options).initialize();
    await dataSource.runMigrations();
    await dataSource.destroy();
    schemas.set(count, snapshotOf(file).schema);
  }
  return schemas;
}

test('killed between any two statements of its migrations, a server leaves the tables of one version whole, every row, and a copy from before; the next start goes on', async () => {
  const old = snapshotOf(oldFile);
  expect(old.ran).toHaveLength(1);
  expect(old.rows.spare).toHaveLength(59);
  expect(old.rows.alert!.length).toBeGreaterThan(0);
  const names = migrations.map(({ name }) => name);
  const schemas = await schemasOnTheWay();
  const folder = oldFolder('killed');
  const random = seededRandom(23);
  const deaths: string[] = [];
  for (let before = old; before.ran.length < names.length;) {
    const died = await start(folder, 1 + Math.floor(random() * 60));
    const after = snapshotOf(databaseFile(folder));
    const told = `start ${deaths.length + 1}, died before ${died}`;
    expect(after.sound, told).toBe(true);
    expect(after.ran, told).toEqual(names.slice(0, after.ran.length));
    expect(after.schema, told).toEqual(schemas.get(after.ran.length));
    const copy = snapshotOf(listBackups(backupFolder(folder))[0]!.file);
    expect({ ...copy, schema: null }, told).toEqual({ ...before, schema: null });
    before = after;
    // From here on it does its work, with what has fallen due since.
    if (after.ran.length === names.length) break;
    expect(after.rows, told).toEqual(old.rows);
    deaths.push(died!);
  }
  expect(await start(folder, -1)).toBe(null);
  const { rows, sound } = snapshotOf(databaseFile(folder));
  expect(sound).toBe(true);
  // What only people change.
  for (const table of ['person', 'spare', 'spare_reading', 'charger', 'channel', 'rest_check', 'charge_reading'])
    expect(rows[table], table).toEqual(old.rows[table]);
  expect(deaths.length).toBeGreaterThanOrEqual(8);
  // Also in the middle of one, not only between two.
  expect(deaths.filter((sql) => !/^(BEGIN|COMMIT)/.test(sql)).length).toBeGreaterThanOrEqual(5);
}, 300_000);
