import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoWorkshopId } from '@/server/demo/demo-workshop';
import { seedDemo } from '@/server/demo/seed';
import { Charge } from '@/server/entities/charge';
import { Workshop } from '@/server/entities/workshop';
import { makeTestServer, type TestServer } from '../../support/server';

let dataDir: string;
beforeAll(() => {
  dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-demo-'));
});
afterAll(() => fs.rmSync(dataDir, { recursive: true, force: true }));

async function seeded(now: number): Promise<TestServer> {
  const fresh = await makeTestServer({ empty: true, demo: true, now, config: { dataDir } });
  await seedDemo(fresh.deps);
  return fresh;
}

describe('the demo', () => {
  it('is made on a day whose last fitted module is the last of its pack', async () => {
    const fresh = await seeded(Date.parse('2026-12-03T02:51:00Z'));
    const { manager } = fresh.deps.dataSource;
    const [{ fitted }] = await manager.query<[{ fitted: number }]>(
      `SELECT count(*) AS fitted FROM second_source WHERE module_position = '16'`,
    );
    expect(fitted).toBeGreaterThan(0);
    await fresh.close();
  }, 300_000);

  it('on a Sunday night makes the same stages, and begins anew where it was cut off', async () => {
    const sunday = Date.parse('2026-03-29T01:30:00Z');
    const fresh = await seeded(sunday);
    const { manager } = fresh.deps.dataSource;
    const stages = async () =>
      (await manager.find(Charge, { select: { id: true, stage: true } })).map(({ stage }) => stage).sort();
    const first = await stages();
    expect(new Set(first).size).toBe(12);
    await manager.update(Workshop, { id: demoWorkshopId }, { rev: 0 });
    await seedDemo(fresh.deps);
    expect(await stages()).toEqual(first);
    expect(await manager.count(Workshop)).toBe(1);
    await fresh.close();
  }, 300_000);
});
