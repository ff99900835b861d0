import Papa from 'papaparse';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { quantile } from '@/calc/index';
import type { WaitChargesDto, WaitsDto } from '@/shared/contract/waits';
import { makeTestServer, testNow, type TestServer } from '../../support/server';
import { stock } from '../../support/stocked';
import { writePast } from './history';

let server: TestServer;
const MANY = 2105;

beforeAll(async () => {
  server = await makeTestServer();
  const stocked = await stock(server.agentFor('manager'));
  await writePast(
    server.deps.dataSource.manager,
    Array.from({ length: MANY }, (_unused, place) => ({
      number: place + 1,
      repairRef: place === 0 ? '=HYPERLINK("x")' : undefined,
      workshopId: server.own.id,
      personId: server.own.people.technician.id,
      spareId: stocked.spare.id,
      typeId: stocked.type.id,
      channelIds: [stocked.charger.channels[0]!.id],
      // Pairs at the same instant, so that a page may end between two equal ones.
      readyAt: testNow - (Math.floor(place / 2) + 1) * 20 * 60_000,
      waitMin: 100 + (place % 300),
      queueMin: 10,
      taperMin: 0,
      restMin: 60,
      checkMin: 5,
      lateMin: (place % 50) - 20,
    })),
  );
});
afterAll(() => server.close());

describe('more waits than a table carries', () => {
  it('count all 2105, and come 100 a page, newest first, each once', async () => {
    const manager = server.agentFor('manager');
    const found = (await manager.get('/api/waits').expect(200)).body as WaitsDto;
    expect(found.charges).toBe(MANY);
    const pages: WaitChargesDto[] = [];
    let after: string | null = '';
    while (after !== null) {
      const page: WaitChargesDto = (await manager.get(`/api/waits/charges${after && `?after=${after}`}`).expect(200))
        .body;
      pages.push(page);
      after = page.next;
    }
    expect(pages).toHaveLength(22);
    const rows = pages.flatMap((page) => page.rows);
    expect(new Set(rows.map(({ chargeId }) => chargeId)).size).toBe(MANY);
    const ready = rows.map(({ readyAt }) => Date.parse(readyAt));
    expect(ready).toEqual([...ready].sort((a, b) => b - a));
  });

  it('come all and once in the CSV, and a title that begins a formula is escaped', async () => {
    const answer = await server.agentFor('manager').get('/api/waits.csv').expect(200);
    const { data } = Papa.parse<string[]>(answer.text.replace('\ufeff', '').trim());
    expect(data).toHaveLength(MANY + 1);
    const titles = data.slice(1).map(([title]) => title!);
    expect(new Set(titles).size).toBe(MANY);
    expect(titles).toContain(`'=HYPERLINK("x")`);
  });
});

describe('median and 90th percentile', () => {
  it('are those of SQLite’s percentile_cont for any waits', async () => {
    const waits = fc.array(fc.integer({ min: 0, max: 400_000 }), { minLength: 1, maxLength: 40 });
    await fc.assert(
      fc.asyncProperty(waits, fc.constantFrom(0.1, 0.5, 0.9), async (seconds, share) => {
        const [row] = (await server.deps.dataSource.query(
          'SELECT percentile_cont(value, ?) AS found FROM json_each(?)',
          [share, JSON.stringify(seconds)],
        )) as { found: number }[];
        expect(quantile(seconds, share)).toBeCloseTo(row!.found, 6);
      }),
      { seed: 5, numRuns: 100 },
    );
  });
});
