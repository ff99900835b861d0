/** What SQLite does for the waits: every statement is asked how it would be carried out, and none reads a whole table. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DataSource, Logger } from 'typeorm';
import { makeDataSource } from '@/server/data-source';
import { fillWaits } from '@/server/services/waits/fill-waits';
import { recordWaits } from '@/server/services/waits/record-waits';
import { findTopUpOf } from '@/server/repositories/charges.repository';
import { workshopForPlans } from '@/server/repositories/workshop-for-plans.repository';
import { makeTestServer, type TestServer } from '../../support/server';
import { stock } from '../../support/stocked';
import { writePast } from './history';

interface Heard {
  sql: string;
  values: unknown[];
}
const heard: Heard[] = [];
const deaf = (): void => {};
const listener: Logger = {
  logQuery: (sql, values) => void heard.push({ sql, values: (values as unknown[] | undefined) ?? [] }),
  ...{ logQueryError: deaf, logQuerySlow: deaf, logSchemaBuild: deaf, logMigration: deaf, log: deaf },
};

let server: TestServer;
let dataSource: DataSource;
beforeAll(async () => {
  dataSource = await makeDataSource(':memory:', listener).initialize();
  await dataSource.runMigrations();
  server = await makeTestServer({ deps: { dataSource } });
  const { type, spare, charger } = await stock(server.agentFor('manager'));
  await writePast(dataSource.manager, [
    {
      ...{ number: 1, workshopId: server.own.id, spareId: spare.id, typeId: type.id, lateMin: 0 },
      ...{ personId: server.own.people.technician.id, channelIds: [charger.channels[0]!.id] },
      ...{
        readyAt: server.clock.now() - 86_400_000,
        waitMin: 120,
        queueMin: 10,
        taperMin: 5,
        restMin: 20,
        checkMin: 3,
      },
    },
  ]);
});
afterAll(async () => {
  await server.close();
  await dataSource.destroy();
});

/** Statements with the way SQLite takes, of what is done. */
async function plansOf(act: () => Promise<unknown>): Promise<{ sql: string; steps: string[] }[]> {
  heard.length = 0;
  await act();
  const asked = heard.filter(({ sql }) => /^\s*(SELECT|UPDATE|DELETE)/i.test(sql));
  const plans: { sql: string; steps: string[] }[] = [];
  for (const { sql, values } of asked) {
    const rows = (await dataSource.query(`EXPLAIN QUERY PLAN ${sql}`, values)) as { detail: string }[];
    plans.push({ sql, steps: rows.map(({ detail }) => detail) });
  }
  return plans;
}
const scans = (plans: Awaited<ReturnType<typeof plansOf>>) =>
  plans.filter(({ steps }) => steps.some((step) => /^SCAN (?!CONSTANT ROW)/.test(step)));

describe('the statements of the waits', () => {
  it.each([
    'waits',
    'waits?weekday=2&way=terminals&stage=queue',
    'waits/groups?by=charger',
    'waits/groups?by=weekday&technicianId=nobody',
    'waits/charges?week=2026-06-01',
    'waits/charges?after=1781000000000.x',
    'waits/compare?compareFrom=2026-04-01&compareTo=2026-04-30',
    'waits.csv',
    'waits.csv?what=channels',
  ])('of GET /%s scan no table, and find the rows of the statistics by their key', async (path) => {
    const plans = await plansOf(() => server.agentFor('manager').get(`/api/${path}`).expect(200));
    expect(scans(plans)).toEqual([]);
    const narrow = plans.filter(({ sql }) => /FROM finished_wait/.test(sql));
    expect(narrow.length).toBeGreaterThan(0);
    for (const { steps } of narrow)
      for (const step of steps.filter((one) => one.includes('finished_wait')))
        expect(step).toMatch(
          /^SEARCH finished_wait USING PRIMARY KEY \(workshop_id=\?( AND ready_at>\? AND ready_at<\?)?\)$/,
        );
    for (const { steps } of plans.filter(({ sql }) => /FROM channel_hold/.test(sql)))
      expect(steps[0]).toContain('USING COVERING INDEX ix_channel_hold_time (workshop_id=? AND state=? AND to_at');
  });

  it('that write a charge down scan no table', async () => {
    const { manager } = dataSource;
    const workshop = await workshopForPlans(manager, server.own.id);
    const plans = await plansOf(() => recordWaits(manager, workshop, [{ id: 'charge-1', readyAt: 1 }]));
    expect(plans.length).toBeGreaterThanOrEqual(5);
    expect(scans(plans)).toEqual([]);
  });

  it('of a charge find the one that went on from it by its own index, not among all of the workshop', async () => {
    const plans = await plansOf(() => findTopUpOf(dataSource.manager, server.own.id, 'charge-1'));
    expect(plans.map(({ steps }) => steps)).toEqual([
      ['SEARCH Charge USING INDEX ix_charge_top_up (workshop_id=? AND top_up_of=?)'],
    ]);
  });

  it('of a start at which nothing is missing only count over indexes', async () => {
    const plans = await plansOf(() => fillWaits(dataSource.manager));
    expect(plans).toHaveLength(1);
    for (const step of plans[0]!.steps.filter((one) => one.startsWith('SCAN') && !one.includes('CONSTANT ROW')))
      expect(step).toContain('USING COVERING INDEX');
  });
});
