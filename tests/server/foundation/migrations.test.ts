import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { assertDurable, makeDataSource } from '@/server/data-source';

const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-migrations-'));
afterAll(() => fs.rmSync(folder, { recursive: true, force: true }));

const open = async (name: string) => {
  const dataSource = await makeDataSource(name === ':memory:' ? name : path.join(folder, name)).initialize();
  await dataSource.runMigrations();
  return dataSource;
};

describe('migrations', () => {
  it('leave no difference between the tables and the entities', async () => {
    const dataSource = await open(':memory:');
    const { upQueries } = await dataSource.driver.createSchemaBuilder().log();
    expect(upQueries.map(({ query }) => query)).toEqual([]);
    // The comparison itself sees a difference when there is one.
    await dataSource.query('DROP INDEX uq_channel_running');
    await dataSource.query('ALTER TABLE spare ADD COLUMN colour varchar');
    expect((await dataSource.driver.createSchemaBuilder().log()).upQueries.length).toBeGreaterThan(0);
    await dataSource.destroy();
  });

  it('go down to an empty database and up again', async () => {
    const dataSource = await open(':memory:');
    for (const _one of dataSource.migrations) await dataSource.undoLastMigration();
    const left = (await dataSource.query(
      "SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%'",
    )) as { name: string }[];
    expect(left.map(({ name }) => name)).toEqual(['migrations']);
    await dataSource.runMigrations();
    expect((await dataSource.driver.createSchemaBuilder().log()).upQueries).toEqual([]);
    await dataSource.destroy();
  });
});

describe('the connection', () => {
  it('writes ahead, syncs every commit, and holds foreign keys', async () => {
    const dataSource = await open('durable.sqlite');
    await expect(assertDurable(dataSource)).resolves.toBeUndefined();
    expect(await dataSource.query('PRAGMA journal_mode')).toEqual([{ journal_mode: 'wal' }]);
    expect(await dataSource.query('PRAGMA synchronous')).toEqual([{ synchronous: 2 }]);
    await expect(
      dataSource.query(
        "INSERT INTO meter (id, workshop_id, name, offset_millivolts, rev) VALUES ('m', 'nobody', 'M', 0, 1)",
      ),
    ).rejects.toThrow(/FOREIGN KEY/);
    await dataSource.destroy();
  });

  it('is refused at start when a commit could be lost', async () => {
    const dataSource = await open('weak.sqlite');
    await dataSource.query('PRAGMA synchronous = NORMAL');
    await expect(assertDurable(dataSource)).rejects.toThrow('synchronous = 1');
    await dataSource.query('PRAGMA synchronous = FULL');
    await dataSource.query('PRAGMA foreign_keys = OFF');
    await expect(assertDurable(dataSource)).rejects.toThrow('foreign_keys = 0');
    await dataSource.destroy();
  });
});
